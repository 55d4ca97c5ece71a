import {type ChildProcess, spawn} from 'node:child_process';
import {readConfig} from './config';
import {makeDataSource} from './db/data-source';
import {PeopleService} from './features/people/people-service';
import {makeLog} from './log';
import {type RunningServer, startServer} from './server';
import {makeEmptyDatabase, type TestDatabase} from './test-support/test-database';
import {testSettings} from './test-support/test-settings';

/** A program of ours, run from its source. */
interface Program {
  readonly child: ChildProcess;
  readonly said: () => string;
  readonly ended: Promise<number | null>;
}

function run(file: string, settings: Record<string, string>, words: string[] = []): Program {
  const bare = {PATH: process.env['PATH'] ?? '', HOME: process.env['HOME'] ?? ''};
  const child = spawn(process.execPath, ['--import', 'tsx', `server/${file}`, ...words], {
    env: {...bare, ...settings},
  });
  let said = '';
  for (const stream of [child.stdout, child.stderr])
    stream.on('data', (chunk: Buffer) => (said += chunk.toString()));
  const ended = new Promise<number | null>((resolve) => child.once('close', resolve));
  return {child, said: () => said, ended};
}

async function waitFor(isSo: () => boolean, tell: () => string): Promise<void> {
  for (const end = Date.now() + 20_000; !isSo();) {
    if (Date.now() > end) throw new Error(`waited in vain: ${tell()}`);
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
}

describe('the server', () => {
  let database: TestDatabase;
  beforeAll(async () => (database = await makeEmptyDatabase()));
  afterAll(() => database.drop());

  const start = (settings: Record<string, string> = {}): Promise<RunningServer> =>
    startServer(
      readConfig(testSettings(database.url, {PORT: '0', ...settings})),
      makeLog('silent'),
    );

  it('migrates an empty database, listens on loopback, and stops', async () => {
    const server = await start();

    const reply = await fetch(`${server.url}/api/health/ready`);
    await server.stop();

    expect(reply.status).toBe(200);
    expect(server.url).toMatch(/^http:\/\/127\.0\.0\.1:\d+$/);
    await expectAsync(fetch(`${server.url}/api/health`)).toBeRejected();
  });

  it('says in one line that its port is taken', async () => {
    const server = await start();
    const {port} = new URL(server.url);

    const second = run('main.ts', testSettings(database.url, {PORT: port}));
    const code = await second.ended;
    await server.stop();

    expect(code).toBe(1);
    expect(second.said().trimEnd().split('\n').at(-1)).toBe(`Port ${port} is taken.`);
  }, 30_000);

  it('says in one line which settings are wrong, and that the database does not answer', async () => {
    const none = run('main.ts', {SESSION_SECRET: 'short', PORT: 'x'});
    const away = run('worker.ts', testSettings('postgres://a:b@127.0.0.1:1/none'));

    expect([await none.ended, await away.ended]).toEqual([1, 1]);
    expect(none.said().trimEnd().split('\n').length).toBe(1);
    expect(none.said()).toMatch(/DATABASE_URL.*PORT.*SESSION_SECRET/);
    expect(away.said().trimEnd()).toBe('The database does not answer.');
  }, 30_000);
});

describe('the programs', () => {
  let database: TestDatabase;
  beforeAll(async () => (database = await makeEmptyDatabase()));
  afterAll(() => database.drop());

  it('seed, server and worker start at once on an empty database and stop when asked', async () => {
    const settings = testSettings(database.url, {PORT: '0', DEMO: '1'});
    const [seed, again, server, worker] = [
      run('seed.ts', settings),
      run('seed.ts', settings),
      run('main.ts', settings),
      run('worker.ts', settings),
    ] as const;

    expect([await seed.ended, await again.ended]).toEqual([0, 0]);
    await waitFor(() => server.said().includes('"listening"'), server.said);
    await waitFor(() => worker.said().includes('"working"'), worker.said);
    server.child.kill('SIGTERM');
    worker.child.kill('SIGINT');

    expect([await server.ended, await worker.ended]).toEqual([0, 0]);
    expect(seed.said()).toBe(again.said());
    expect(seed.said()).toMatch(/ines\.holt@harrow-lane\.example +trainee +Harrow Lane Converting/);
    expect(seed.said()).toContain('Password of all: ');
  }, 60_000);

  it('an organisation is made from the command line, with an administrator who can sign in', async () => {
    const tool = (...words: string[]): Program =>
      run('../tools/organisation.ts', {DATABASE_URL: database.url}, words);
    const made = tool('create', 'Quiet Mill', 'Head@Quiet-Mill.example');
    const code = await made.ended;
    const [again, useless] = [tool('create', 'Other', 'head@quiet-mill.example'), tool('create')];

    expect([code, await again.ended, await useless.ended]).toEqual([0, 1, 2]);
    expect(again.said()).toContain('The address head@quiet-mill.example is in use.');
    expect(useless.said()).toContain('usage: ');
    const password = /with (\S+)\n$/.exec(made.said())?.[1] ?? 'none printed';
    const db = await makeDataSource(database.url).initialize();
    const caller = await new PeopleService(db).findBySignIn('head@quiet-mill.example', password);
    const [{n}] = await db.query<[{n: number}]>(
      "select count(*)::int as n from organisation where name in ('Quiet Mill', 'Other')",
    );
    await db.destroy();
    expect([caller?.role, n]).toEqual(['administrator', 1]);
  }, 60_000);
});
