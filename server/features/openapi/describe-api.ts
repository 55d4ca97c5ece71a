import * as z from 'zod';
import {
  createDocument,
  type ZodOpenApiOperationObject,
  type ZodOpenApiPathsObject,
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
  const {params, query, body} = partsOf(endpoint);
  const bodyType = endpoint.kind === 'upload' ? 'multipart/form-data' : 'application/json';
  const isUpload = endpoint.kind === 'upload';
  const file = z.object({
    file: z.file().meta({description: `At most ${isUpload ? endpoint.maxBytes : 0} bytes.`}),
  });
  const sent = isUpload ? file : body;
  return {
    summary: endpoint.summary,
    'x-access': endpoint.access,
    requestParams: {
      ...(params instanceof z.ZodObject && {path: params}),
      ...(query instanceof z.ZodObject && {query}),
    },
    ...(sent && {requestBody: {required: true, content: {[bodyType]: {schema: sent}}}}),
    responses: responsesOf(endpoint),
  };
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

function answerOf(endpoint: Endpoint): ZodOpenApiResponsesObject[`${1 | 2 | 3 | 4 | 5}${string}`] {
  switch (endpoint.kind) {
    case 'download':
      return {description: 'The file.', content: {[endpoint.mediaType]: {}}};
    case 'events':
      return {description: 'Server-sent events.', content: {'text/event-stream': {}}};
    default:
      return {description: 'The answer.', content: {'application/json': {schema: endpoint.reply}}};
  }
}
