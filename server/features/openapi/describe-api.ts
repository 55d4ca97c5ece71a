import * as z from 'zod';
import {
  createDocument,
  type ZodOpenApiContentObject,
  type ZodOpenApiOperationObject,
  type ZodOpenApiPathsObject,
  type ZodOpenApiResponseObject,
  type ZodOpenApiResponsesObject,
} from 'zod-openapi';
import {type Endpoint} from '#shared/endpoint';
import {Problem} from '#shared/problem';

/** The OpenAPI 3.1 document of these endpoints. */
export function describeApi(
  endpoints: readonly Endpoint[],
  build: string,
): Record<string, unknown> {
  const paths: ZodOpenApiPathsObject = {};
  for (const endpoint of endpoints) {
    const path = endpoint.path.replace(/:(\w+)/g, '{$1}');
    paths[path] = {...paths[path], [endpoint.method]: describe(endpoint)};
  }
  const document = createDocument(
    {
      openapi: '3.1.0',
      info: {title: 'Evenspan', version: build},
      servers: [{url: '/api'}],
      paths,
    },
    {allowEmptySchema: {custom: true}}, // documents that are checked where they are written
  );
  return JSON.parse(JSON.stringify(document)) as Record<string, unknown>;
}

function describe(endpoint: Endpoint): ZodOpenApiOperationObject {
  const {params, query} = partsOf(endpoint);
  const content = contentOf(endpoint);
  return {
    summary: endpoint.summary,
    'x-access': endpoint.access,
    requestParams: {
      ...(params instanceof z.ZodObject && {path: params}),
      ...(query instanceof z.ZodObject && {query}),
    },
    ...(content && {requestBody: {required: true, content}}),
    responses: responsesOf(endpoint),
  };
}

function contentOf(endpoint: Endpoint): ZodOpenApiContentObject | undefined {
  const {body} = partsOf(endpoint);
  if (endpoint.kind !== 'upload') return body && {'application/json': {schema: body}};
  const file = z.file().max(endpoint.maxBytes);
  const fields = body instanceof z.ZodObject ? body.shape : {};
  return {'multipart/form-data': {schema: z.object({...fields, file})}};
}

function partsOf({input}: Endpoint): Record<'params' | 'query' | 'body', z.ZodType | undefined> {
  const shape = (input instanceof z.ZodObject ? input.shape : {}) as Record<string, z.ZodType>;
  return {params: shape['params'], query: shape['query'], body: shape['body']};
}

function responsesOf(endpoint: Endpoint): ZodOpenApiResponsesObject {
  const problem = {
    description: 'Why not.',
    content: {'application/problem+json': {schema: Problem}},
  };
  return {'200': answerOf(endpoint), default: problem};
}

function answerOf(endpoint: Endpoint): ZodOpenApiResponseObject {
  switch (endpoint.kind) {
    case 'download':
      return {description: 'The file.', content: {[endpoint.mediaType]: {}}};
    case 'events':
      return {description: 'Server-sent events.', content: {'text/event-stream': {}}};
    default:
      return {description: 'The answer.', content: {'application/json': {schema: endpoint.reply}}};
  }
}
