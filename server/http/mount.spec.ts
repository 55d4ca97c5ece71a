import * as z from 'zod';
import {endpoint} from '#shared/endpoint';
import {type Problem} from '#shared/problem';
import {AppError} from '../errors';
import {type Agent, useTestServer} from '../test-support/test-server';
import {mount, mountPublic} from './mount';
import {mountedOn} from './mounted';

const base = {access: 'signed-in', summary: 'For this spec.'} as const;

const weigh = endpoint({
  ...base,
  kind: 'json',
  method: 'post',
  path: '/spec/rolls/:rollId',
  input: z.object({
    params: z.object({rollId: z.uuid()}),
    query: z.object({unit: z.enum(['kg', 'lb']).default('kg')}),
    body: z.strictObject({
      name: z.string().max(2000),
      widths: z.array(z.number().positive()).max(5),
      password: z.string().max(5).optional(),
    }),
  }),
  reply: z.strictObject({weightKg: z.number(), unit: z.string(), by: z.string()}),
});
const readOthers = endpoint({
  ...base,
  kind: 'json',
  method: 'get',
  path: '/spec/others',
  access: 'attempts:read-others',
  input: z.object({}),
  reply: z.string(),
});
const upload = endpoint({
  ...base,
  kind: 'upload',
  method: 'post',
  path: '/spec/files',
  input: z.object({body: z.object({note: z.string()})}),
  reply: z.strictObject({name: z.string(), bytes: z.number(), note: z.string()}),
  maxBytes: 1000,
});
const download = endpoint({
  ...base,
  kind: 'download',
  method: 'get',
  path: '/spec/list.csv',
  input: z.object({}),
  mediaType: 'text/csv; charset=utf-8',
});
const ROLL = '0198a000-0000-7000-8000-000000000001';

describe('a mounted endpoint', () => {
  const server = useTestServer();
  let agent: Agent;
  let personId: string;
  let weightKg: number;

  beforeAll(async () => {
    const {api} = server().app;
    mount(api, weigh, ({query, body}, caller) => {
      if (body.name === 'fault') throw new Error('a secret of the inside');
      if (body.name === 'in use') throw new AppError('in-use', {detail: 'Somebody has it.'});
      return Promise.resolve({weightKg, unit: query.unit, by: caller.personId});
    });
    mount(api, readOthers, () => Promise.resolve('others'));
    mount(api, upload, ({body}, caller, {name, bytes}) =>
      Promise.resolve({name, bytes: bytes.length, note: body.note}),
    );
    mount(api, download, () => Promise.resolve({fileName: 'list "α".csv', body: 'a,b\n1,2\n'}));
    const trainee = await server().signedInAs('trainee');
    agent = trainee.agent;
    personId = trainee.caller.personId;
  });

  beforeEach(() => (weightKg = 12));

  const post = (body: unknown, path = ROLL) =>
    agent.post(`/api/spec/rolls/${path}`).send(body as object);
  const good = {name: 'full', widths: [1.2]};

  describe('refuses', () => {
    it('who is not signed in, before it reads a byte', async () => {
      const visitor = await server().visitor();

      const {body} = await visitor.post(`/api/spec/rolls/${ROLL}`).send({broken: true}).expect(401);

      expect(body.code).toBe('not-signed-in');
    });

    it('a role without the permission', async () => {
      const {body} = await agent.get('/api/spec/others').expect(403);

      expect(body.code).toBe('not-allowed');
    });

    it('a writing call without the token of the session', async () => {
      const {body} = await post(good).set('X-XSRF-TOKEN', 'guessed').expect(403);

      expect(body.code).toBe('forged-request');
    });

    it('every wrong field, with its place and its value', async () => {
      const sent = {name: 3, widths: [1, -2], extra: true};

      const {body, headers} = await post(sent, 'no-id').query({unit: 'stone'}).expect(400);

      expect(headers['content-type']).toContain('application/problem+json');
      expect(body).toEqual(
        jasmine.objectContaining({
          type: 'urn:evenspan:problem:invalid-input',
          code: 'invalid-input',
          status: 400,
          requestId: String(headers['request-id']),
        }),
      );
      const errors = body.errors as {path: string; message: string; value?: unknown}[];
      expect(errors.map(({path, value}) => [path, value])).toEqual([
        ['params.rollId', 'no-id'],
        ['query.unit', 'stone'],
        ['body.name', 3],
        ['body.widths.1', -2],
        ['body', sent],
      ]);
      expect(errors.at(-1)?.message).toContain('extra');
    });

    it('a body that is missing', async () => {
      const {body} = await agent.post(`/api/spec/rolls/${ROLL}`).expect(400);

      expect(body.errors[0].path).toBe('body');
    });

    it('a wrong secret without telling it back', async () => {
      const {body} = await post({...good, password: 'very secret'}).expect(400);

      expect(body.errors[0].path).toBe('body.password');
      expect(JSON.stringify(body)).not.toContain('very secret');
    });

    it('a long wrong value with only its beginning told back', async () => {
      const {body} = await post({...good, name: 'x'.repeat(2001)}).expect(400);

      expect(body.errors[0].value.length).toBeLessThan(250);
    });

    it('a body that is not JSON', async () => {
      const {body} = await post('{"name":').type('json').expect(400);

      expect(body.code).toBe('invalid-input');
      expect(body.errors[0].path).toBe('body');
    });

    it('another kind of content', async () => {
      const {body} = await post('<name/>').type('application/xml').expect(415);

      expect(body.code).toBe('unsupported-media');
    });

    it('more than 64 kB', async () => {
      const {body} = await post({...good, name: 'x'.repeat(64 * 1024)}).expect(413);

      expect(body.code).toBe('body-too-large');
      expect(body.detail).toContain('64 kB');
    });

    it('what the handler refuses, by its code', async () => {
      const {body} = await post({...good, name: 'in use'}).expect(409);

      expect([body.code, body.detail]).toEqual(['in-use', 'Somebody has it.']);
    });
  });

  describe('answers', () => {
    it('what the handler returns, who calls being known', async () => {
      const {body} = await post(good).query({unit: 'lb'}).expect(200);

      expect(body).toEqual({weightKg: 12, unit: 'lb', by: personId});
    });

    it('internal, and no word of the inside, to a fault of ours', async () => {
      const {body, headers} = await post({...good, name: 'fault'}).expect(500);

      expect(body.code).toBe('internal');
      expect(JSON.stringify(body)).not.toContain('secret of the inside');
      const logged = server().logged.find((line) => line.includes('secret of the inside')) ?? '';
      expect(logged).toContain(headers['request-id'] ?? 'no id');
    });

    it('internal when its own reply does not fit', async () => {
      weightKg = NaN;

      const {body} = await post(good).expect(500);

      expect(body.code).toBe('internal');
      expect(server().logged.some((line) => line.includes('does not fit its schema'))).toBeTrue();
    });

    it('is never kept by anything between', async () => {
      const {headers} = await post(good).expect(200);

      expect(headers['cache-control']).toBe('no-store');
    });
  });

  describe('that takes a file', () => {
    const send = () => agent.post('/api/spec/files').field('note', 'a roll');

    it('gets its name, its bytes and the fields', async () => {
      const {body} = await send().attach('file', Buffer.from('12345'), 'roll.csv').expect(200);

      expect(body).toEqual({name: 'roll.csv', bytes: 5, note: 'a roll'});
    });

    it('refuses one that is too large', async () => {
      const {body} = await send().attach('file', Buffer.alloc(1001), 'roll.csv').expect(413);

      expect(body.code).toBe('body-too-large');
    });

    it('refuses none, two, and one under another name', async () => {
      const none = await send().expect(400);
      const two = await send()
        .attach('file', Buffer.from('1'), 'a')
        .attach('file', Buffer.from('2'), 'b')
        .expect(400);
      const other = await send().attach('picture', Buffer.from('1'), 'a').expect(400);

      expect([none, two, other].map(({body}) => (body as Problem).errors[0]?.path)).toEqual([
        'file',
        'file',
        'picture',
      ]);
    });

    it('refuses JSON', async () => {
      const {body} = await agent.post('/api/spec/files').send({note: 'x'}).expect(415);

      expect(body.code).toBe('unsupported-media');
    });
  });

  it('sends a file as an attachment with its name', async () => {
    const {headers, text} = await agent.get('/api/spec/list.csv').expect(200);

    expect(text).toBe('a,b\n1,2\n');
    expect(headers['content-type']).toBe('text/csv; charset=utf-8');
    expect(headers['content-disposition']).toContain("filename*=UTF-8''list%20%22%CE%B1%22.csv");
  });

  it('is found on the router with its description', () => {
    const mounted = mountedOn(server().app.api).find(({path}) => path === '/spec/rolls/:rollId');

    expect(mounted).toEqual({method: 'post', path: '/spec/rolls/:rollId', endpoint: weigh});
  });

  it('cannot be mounted for everybody by mistake, nor the other way round', () => {
    const {api} = server().app;
    const open = endpoint({...readOthers, access: 'public'});

    expect(() => mount(api, open, () => Promise.resolve(''))).toThrowError(/use mountPublic/);
    expect(() => mountPublic(api, readOthers, () => Promise.resolve(''))).toThrowError(/use mount/);
  });
});
