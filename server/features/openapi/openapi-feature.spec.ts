import * as z from 'zod';
import {mountedOn} from '../../http/mounted';
import {useTestServer} from '../../test-support/test-server';
import {describeApi} from './describe-api';

describe('the description of the API', () => {
  const server = useTestServer();

  it('is refused to who is not signed in', async () => {
    const visitor = await server().visitor();

    await visitor.get('/api/openapi.json').expect(401);
  });

  it('holds every route of the running server, with what goes in and what comes out', async () => {
    const {agent} = await server().signedInAs('trainee');

    const {body} = await agent.get('/api/openapi.json').expect(200);

    const described = Object.entries(body.paths as Record<string, object>).flatMap(
      ([path, operations]) => Object.keys(operations).map((method) => `${method} ${path}`),
    );
    const mounted = mountedOn(server().app.api).map(
      ({method, path}) => `${method} ${path.replace(/:(\w+)/g, '{$1}')}`,
    );
    expect(described.sort()).toEqual(mounted.sort());
    const signIn = body.paths['/session'].post;
    expect(signIn['x-access']).toBe('public');
    expect(
      Object.keys(signIn.requestBody.content['application/json'].schema.properties as object),
    ).toEqual(['email', 'password']);
    expect(signIn.responses['200'].content['application/json'].schema.required).toContain('me');
    expect(signIn.responses.default.content['application/problem+json']).toBeDefined();
  });

  it('tells what an upload takes and what a download gives', () => {
    const base = {access: 'signed-in', summary: 'For this spec.', input: z.object({})} as const;
    const described = describeApi(
      [
        {...base, kind: 'upload', method: 'post', path: '/u/:id', reply: z.null(), maxBytes: 99},
        {...base, kind: 'download', method: 'get', path: '/d', mediaType: 'text/csv'},
      ],
      'build',
    );

    const paths = described['paths'] as Record<string, Record<string, unknown>>;
    expect(paths['/u/{id}']?.['post']).toEqual(
      jasmine.objectContaining({
        requestBody: {
          required: true,
          content: {
            'multipart/form-data': {
              schema: jasmine.objectContaining({required: ['file']}),
            },
          },
        },
      }),
    );
    expect(JSON.stringify(paths['/d']?.['get'])).toContain('"200":{"description":"The file."');
    expect(JSON.stringify(paths['/d']?.['get'])).toContain('text/csv');
  });
});
