import {type Response} from 'supertest';
import {useTestServer} from '../test-support/test-server';
import {type Answer, type Row, TENANCY} from '../test-support/tenancy-table';
import {
  agentOf,
  makeWorld,
  type Visitor,
  VISITORS,
  type World,
} from '../test-support/tenancy-world';
import {mountedOn} from './mounted';

describe('every route, for every role of the own and of a foreign organisation', () => {
  const server = useTestServer();
  let world: World;
  beforeAll(async () => (world = await makeWorld(server())));

  const routes = (): string[] =>
    mountedOn(server().app.api).map(({method, path}) => `${method.toUpperCase()} ${path}`);

  it('has a row in the table, and every row a route', () => {
    expect(Object.keys(TENANCY).sort()).toEqual(routes().sort());
  });

  for (const [route, row] of Object.entries(TENANCY)) {
    it(`${route} answers as the table says`, async () => {
      const answers: Partial<Record<Visitor, Answer>> = {};
      for (const visitor of VISITORS) answers[visitor] = await answerOf(route, row, visitor);

      expect(answers).toEqual(row.answers);
    });
  }

  async function answerOf(route: string, row: Row, visitor: Visitor): Promise<Answer> {
    const [method = '', pattern = ''] = route.split(' ');
    const {params = {}, query = {}, body} = (await row.call?.(world)) ?? {};
    const path = pattern.replace(/:(\w+)/g, (_, name: string) => {
      const value = params[name];
      if (value === undefined) throw new Error(`the row of ${route} has no ${name}`);
      return value;
    });
    const agent = await agentOf(world, visitor, row.changesSession ?? false);
    const call = agent[method.toLowerCase() as 'get'](`/api${path}`).query(query);
    // A stream of events never ends by itself: its first lines are the answer.
    if (route === 'GET /events') void call.buffer(false).parse(cutOff);
    const reply = await call.send(body);
    const isStranger = visitor.startsWith('foreign') && !row.changesSession; // else signed in as the owner
    const text = JSON.stringify([reply.body, reply.text]);
    const told = world.hidden.filter((word) => isStranger && reply.ok && text.includes(word));
    expect(told).withContext(`what ${visitor} reads at ${route}`).toEqual([]);
    return reply.ok ? 'ok' : (reply.body as {code: Answer}).code;
  }
});

function cutOff(res: Response, done: (error: Error | null, body: unknown) => void): void {
  let text = '';
  const stream = res as unknown as NodeJS.ReadableStream & {destroy: () => void};
  const isStream = res.headers['content-type'] === 'text/event-stream';
  stream.on('data', (chunk: Buffer) => {
    text += chunk.toString();
    if (!isStream) return;
    done(null, {});
    stream.destroy();
  });
  stream.on('end', () => done(null, JSON.parse(text)));
}
