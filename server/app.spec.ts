import {mkdirSync, mkdtempSync, rmSync, writeFileSync} from 'node:fs';
import {tmpdir} from 'node:os';
import path from 'node:path';
import supertest from 'supertest';
import {mountedOn} from './http/mounted';
import {type DatabaseProxy, startDatabaseProxy} from './test-support/database-proxy';
import {makeTestDatabase, type TestDatabase} from './test-support/test-database';
import {startTestServer, type TestServer, useTestServer} from './test-support/test-server';

const POLICY = [
  "default-src 'self'",
  "script-src 'self'",
  "style-src 'self' 'unsafe-inline'",
  "img-src 'self' data: blob:",
  "object-src 'none'",
  "frame-ancestors 'none'",
  "base-uri 'self'",
  "form-action 'self'",
];

describe('the app', () => {
  const folder = mkdtempSync(path.join(tmpdir(), 'evenspan-client-'));
  mkdirSync(path.join(folder, 'media'));
  writeFileSync(path.join(folder, 'index.html'), '<!doctype html><title>Evenspan</title>');
  writeFileSync(path.join(folder, 'main-AB12CD34.js'), `const long = '${'x'.repeat(4000)}';`);
  writeFileSync(path.join(folder, 'media', 'plain.svg'), '<svg/>');
  const server = useTestServer({CLIENT_FOLDER: folder});
  const get = (address: string) => supertest(server().http).get(address);
  afterAll(() => rmSync(folder, {recursive: true}));

  describe('serves the client', () => {
    it('at every address that is no file, and has it asked for anew', async () => {
      for (const address of ['/', '/bench', '/exercises/7/run?seed=1']) {
        const {text, headers} = await get(address).expect(200);

        expect(text).toContain('<title>Evenspan</title>');
        expect(headers['cache-control']).toBe('no-cache');
      }
    });

    it('with files kept for good when their name carries a hash', async () => {
      const hashed = await get('/main-AB12CD34.js').expect(200);
      const plain = await get('/media/plain.svg').expect(200);

      expect(hashed.headers['cache-control']).toBe('public, max-age=31536000, immutable');
      expect(plain.headers['cache-control']).toBe('no-cache');
    });

    it('compressed', async () => {
      const {headers} = await get('/main-AB12CD34.js').set('Accept-Encoding', 'gzip');

      expect(headers['content-encoding']).toBe('gzip');
    });

    it('but never a page for a file that is gone, a writing call, or a path that leads out', async () => {
      const gone = await get('/main-00000000.js').expect(404);
      const write = await supertest(server().http).post('/bench').expect(404);
      const out = await get('/..%2f..%2fetc%2fpasswd');

      expect([gone.body.code, write.body.code]).toEqual(['not-found', 'not-found']);
      expect(out.text).not.toContain('root:');
    });
  });

  it('answers what is unknown below /api with a problem', async () => {
    const {body, headers} = await get('/api/nowhere').expect(404);

    expect(headers['content-type']).toContain('application/problem+json');
    expect(body).toEqual({
      type: 'urn:evenspan:problem:not-found',
      code: 'not-found',
      title: 'There is nothing here.',
      detail: 'There is no GET /api/nowhere.',
      status: 404,
      requestId: headers['request-id'] ?? '',
      errors: [],
    });
  });

  it('answers a known path under another verb, and one that cannot be read, with a problem', async () => {
    const verb = await supertest(server().http).put('/api/health').expect(404);
    const unreadable = await get('/api/%E0%A4%A').expect(404);

    expect([verb.body.code, unreadable.body.code]).toEqual(['not-found', 'not-found']);
  });

  it('names its build and allows nothing but itself, on pages and answers alike', async () => {
    for (const address of ['/', '/api/health', '/api/nowhere']) {
      const {headers} = await get(address);

      expect(headers['content-security-policy']?.split(';')).toEqual(POLICY);
      expect(headers['evenspan-build']).toBe(server().parts.config.build);
      expect(headers['x-content-type-options']).toBe('nosniff');
      expect(headers['x-powered-by']).toBeUndefined();
    }
    expect(server().parts.config.build).toMatch(/^[0-9a-f]{12}$/);
  });

  it('says that it is up, and that the database is ready', async () => {
    const build = server().parts.config.build;

    expect((await get('/api/health').expect(200)).body).toEqual({status: 'up', build});
    expect((await get('/api/health/ready').expect(200)).body).toEqual({status: 'ready', build});
  });

  it('mounts every route with a description', () => {
    const bare = mountedOn(server().app.api).filter(({endpoint}) => !endpoint);

    expect(bare).toEqual([]);
  });

  it('logs a call with its id, but no header and nothing behind the question mark', async () => {
    const {headers} = await get('/api/health?token=one-use').set('Cookie', 'crumbs=secret');

    const line = server().logged.find((each) => each.includes(String(headers['request-id'])));
    expect(line).toContain('"path":"/api/health"');
    expect(line).not.toMatch(/one-use|crumbs/);
  });
});

describe('the app, when its client is not built', () => {
  const server = useTestServer({CLIENT_FOLDER: '/nowhere'});

  it('says so', async () => {
    const {body} = await supertest(server().http).get('/').expect(503);

    expect([body.code, body.detail]).toEqual(['unavailable', 'The pages are not built.']);
  });
});

describe('the app, when its database is gone', () => {
  let database: TestDatabase;
  let proxy: DatabaseProxy;
  let server: TestServer;

  beforeEach(async () => {
    database = await makeTestDatabase();
    proxy = await startDatabaseProxy(database.url);
    server = await startTestServer({DATABASE_URL: proxy.url});
  });

  afterEach(async () => {
    await server.close();
    await proxy.cut();
    await database.drop();
  });

  it('is up, not ready, answers unavailable, and goes on once it is back', async () => {
    const {agent} = await server.signedInAs('trainee');
    await agent.get('/api/health/ready').expect(200);

    await proxy.cut();
    const [health, ready, session] = [
      await agent.get('/api/health'),
      await agent.get('/api/health/ready'),
      await agent.get('/api/session'),
    ];
    await proxy.mend();

    expect(health.status).toBe(200);
    expect([ready.status, ready.body.status]).toEqual([503, 'not-ready']);
    expect([session.status, session.body.code]).toEqual([503, 'unavailable']);
    const {body} = await agent.get('/api/session').expect(200);
    expect(body.me.role).toBe('trainee');
  });
});
