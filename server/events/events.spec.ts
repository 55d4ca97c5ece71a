import http from 'node:http';
import {type Nudge} from '#shared/events/events';
import {type DatabaseProxy, startDatabaseProxy} from '../test-support/database-proxy';
import {makeTestDatabase, type TestDatabase} from '../test-support/test-database';
import {
  type SignedIn,
  startTestServer,
  type TestServer,
  useTestServer,
} from '../test-support/test-server';
import {CHANNEL, notify} from './notify';

const ATTEMPT = '0198a000-0000-7000-8000-00000000000a';

/** An open stream as a page has it. */
interface Reader {
  readonly headers: http.IncomingHttpHeaders;
  readonly nudges: Nudge[];
  readonly text: () => string;
  readonly hasEnded: () => boolean;
  readonly close: () => void;
}

/** Opens a stream as this person. */
function follow(server: TestServer, {cookie}: SignedIn, topics: string): Promise<Reader> {
  return new Promise((resolve, reject) => {
    const address = `${server.url}/api/events?topics=${topics}`;
    const req = http.get(
      address,
      {agent: false, headers: {Cookie: cookie, 'Accept-Encoding': 'gzip'}},
      (res) => {
        let text = '';
        let hasEnded = false;
        const nudges: Nudge[] = [];
        res.on('data', (chunk: Buffer) => {
          text += chunk.toString();
          for (const [, json = ''] of chunk.toString().matchAll(/^data: (.*)$/gm))
            nudges.push(JSON.parse(json) as Nudge);
        });
        res.on('close', () => (hasEnded = true));
        res.on('error', () => (hasEnded = true));
        resolve({
          headers: res.headers,
          nudges,
          text: () => text,
          hasEnded: () => hasEnded,
          close: () => req.destroy(),
        });
      },
    );
    req.on('error', reject);
  });
}

async function waitFor(isSo: () => boolean): Promise<void> {
  for (const end = Date.now() + 10_000; !isSo();) {
    if (Date.now() > end) throw new Error('waited in vain');
    await new Promise((resolve) => setTimeout(resolve, 5));
  }
}

const tell = (server: TestServer, organisationId: string, topic: string, id: string) =>
  server.db.transaction((manager) => notify(manager, organisationId, topic, 'scored', id));

describe('events', () => {
  const server = useTestServer();
  const readers: Reader[] = [];
  afterEach(() => readers.splice(0).forEach((reader) => reader.close()));

  beforeAll(() => {
    const {events} = server().parts;
    events.allow('attempts', ({role}) => Promise.resolve(role === 'instructor'));
    events.allow('attempt', (caller, id) => Promise.resolve(id === ATTEMPT));
  });

  const open = async (who: SignedIn, topics: string): Promise<Reader> => {
    const reader = await follow(server(), who, topics);
    readers.push(reader);
    return reader;
  };

  describe('refuse', () => {
    it('who is not signed in', async () => {
      const visitor = await server().visitor();

      await visitor.get('/api/events').query({topics: 'attempts'}).expect(401);
    });

    it('a topic whose rule says no, as if it were not there', async () => {
      const {agent} = await server().signedInAs('trainee');
      const topics = `attempt:${ATTEMPT},attempts`;

      const {body} = await agent.get('/api/events').query({topics}).expect(404);

      expect(body.code).toBe('not-found');
    });

    it('topics that there are not, and too many', async () => {
      const {agent} = await server().signedInAs('trainee');
      const many = Array.from({length: 21}, (_, n) => ATTEMPT.slice(0, -2) + String(10 + n));

      const unknown = await agent.get('/api/events').query({topics: 'everything'}).expect(400);
      const tooMany = await agent
        .get('/api/events')
        .query({topics: many.map((id) => `attempt:${id}`).join()})
        .expect(400);
      await agent.get('/api/events').expect(400);

      expect(unknown.body.errors[0].value).toBe('everything');
      expect(tooMany.body.errors[0].value).toBe(21);
    });
  });

  describe('reach', () => {
    it('who follows the topic, once the transaction is committed', async () => {
      const trainee = await server().signedInAs('trainee');
      const reader = await open(trainee, `attempt:${ATTEMPT}`);
      const {organisationId} = trainee.caller;
      const topic = `attempt:${ATTEMPT}`;

      await server()
        .db.transaction(async (manager) => {
          await notify(manager, organisationId, topic, 'scored', 'rolled back');
          throw new Error('rolled back');
        })
        .catch(() => undefined);
      await tell(server(), organisationId, topic, 'kept');
      await waitFor(() => reader.nudges.length > 0);

      expect(reader.nudges).toEqual([{topic, kind: 'scored', id: 'kept'}]);
    });

    it('nobody of another organisation, nor who follows something else', async () => {
      const instructor = await server().signedInAs('instructor');
      const {organisationId} = instructor.caller;
      const stranger = await server().signedInAs('instructor');
      const [all, one, foreign] = [
        await open(instructor, 'attempts'),
        await open(instructor, `attempt:${ATTEMPT}`),
        await open(stranger, 'attempts'),
      ];

      await tell(server(), organisationId, 'attempts', 'first');
      await tell(server(), stranger.caller.organisationId, 'attempts', 'second');
      await waitFor(() => all.nudges.length > 0 && foreign.nudges.length > 0);

      expect(all.nudges.map(({id}) => id)).toEqual(['first']);
      expect(foreign.nudges.map(({id}) => id)).toEqual(['second']);
      expect(one.nudges).toEqual([]);
    });

    it('through anything between, at once: not compressed, not held back', async () => {
      const {headers} = await open(await server().signedInAs('instructor'), 'attempts');

      expect(headers['content-type']).toBe('text/event-stream');
      expect(headers['x-accel-buffering']).toBe('no');
      expect(headers['content-encoding']).toBeUndefined();
      expect(headers['cache-control']).toContain('no-transform');
    });
  });

  it('are followed by a beat while nothing happens', async () => {
    const reader = await open(await server().signedInAs('instructor'), 'attempts');
    const before = reader.text().length;

    server().parts.events.beat();
    await waitFor(() => reader.text().length > before);

    expect(reader.text()).toMatch(/^(: \n\n)+$/);
    expect(reader.nudges).toEqual([]);
  });

  it('go on after a notice that nobody can read', async () => {
    const instructor = await server().signedInAs('instructor');
    const reader = await open(instructor, 'attempts');
    await server().db.query('select pg_notify($1, $2)', [CHANNEL, 'not JSON']);

    await tell(server(), instructor.caller.organisationId, 'attempts', 'after');
    await waitFor(() => reader.nudges.length > 0);

    expect(server().logged.some((line) => line.includes('nobody can read'))).toBeTrue();
  });
});

describe('events, when the database is cut off', () => {
  let database: TestDatabase;
  let proxy: DatabaseProxy;
  let server: TestServer;

  beforeAll(async () => {
    database = await makeTestDatabase();
    proxy = await startDatabaseProxy(database.url);
    server = await startTestServer({DATABASE_URL: proxy.url});
    server.parts.events.allow('attempts', () => Promise.resolve(true));
  });

  afterAll(async () => {
    await server.close();
    await proxy.cut();
    await database.drop();
  });

  it('end, so that the reader comes back and reads again, and then flow anew', async () => {
    const instructor = await server.signedInAs('instructor');
    const before = await follow(server, instructor, 'attempts');

    await proxy.cut();
    await waitFor(before.hasEnded);
    await proxy.mend();
    const after = await follow(server, instructor, 'attempts');
    for (const end = Date.now() + 10_000; after.nudges.length === 0 && Date.now() < end;) {
      await tell(server, instructor.caller.organisationId, 'attempts', 'again');
      await new Promise((resolve) => setTimeout(resolve, 50));
    }

    expect(after.nudges[0]?.id).toBe('again');
    after.close();
  }, 20_000);
});

describe('a server that closes', () => {
  it('ends its event streams, and does not wait for their readers', async () => {
    const server = await startTestServer();
    server.parts.events.allow('attempts', () => Promise.resolve(true));
    const reader = await follow(server, await server.signedInAs('instructor'), 'attempts');
    const began = performance.now();

    await server.close();

    expect(performance.now() - began).toBeLessThan(9000); // else it waits the ten seconds that calls may take
    await waitFor(reader.hasEnded);
  });
});
