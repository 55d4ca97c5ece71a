import {type ChildProcess, spawn} from 'node:child_process';
import path from 'node:path';
import * as z from 'zod';
import {slowJob} from '../test-support/slow-job';
import {useTestServer} from '../test-support/test-server';
import {job, type WorkerParts} from './job';
import {makeBoss} from './boss';
import {QueueLoop} from './queue-loop';
import {makeQueues} from './queues';
import {startWorker} from './worker';

const UPKEEP_S = 1;

describe('jobs', () => {
  const server = useTestServer();
  const weigh = job({
    name: 'spec-weigh',
    data: z.object({roll: z.number(), fails: z.number().default(0)}),
    expireInSeconds: 30,
    retryLimit: 1,
    run: (data) => run(data),
    givenUp: ({roll}) => Promise.resolve(void givenUp.push(roll)),
  });
  let run: (data: {roll: number; fails: number}) => Promise<void>;
  let givenUp: number[] = [];
  let done: number[] = [];

  beforeAll(async () => {
    const {config, log} = server().parts;
    await makeQueues(config.databaseUrl, [weigh], log);
  });

  beforeEach(() => {
    done = [];
    givenUp = [];
    run = ({roll}) => Promise.resolve(void done.push(roll));
  });

  const send = (data: {roll: number}) =>
    server().db.transaction((manager) => server().parts.jobs.send(manager, weigh, data));
  const withWorker = async (until: () => boolean): Promise<void> => {
    const parts: WorkerParts = server().parts;
    const worker = await startWorker([weigh], parts, UPKEEP_S);
    await waitFor(until);
    await worker.stop();
  };

  it('are sent with the transaction of their row, and not when it is rolled back', async () => {
    const {db, parts} = server();
    const thrown = await db
      .transaction(async (manager) => {
        await parts.jobs.send(manager, weigh, {roll: 1});
        throw new Error('the row is refused');
      })
      .catch((error: unknown) => error);
    await send({roll: 2});

    await withWorker(() => done.length > 0);

    expect((thrown as Error).message).toBe('the row is refused');
    expect(done).toEqual([2]);
  });

  it('are refused when their data or their queue is not right', async () => {
    const {db, parts} = server();
    const other = job({...weigh, name: 'spec-no-queue'});

    await expectAsync(
      db.transaction((manager) => parts.jobs.send(manager, other, {roll: 1})),
    ).toBeRejectedWithError(/no queue named spec-no-queue/);
    await expectAsync(
      db.transaction((manager) => parts.jobs.send(manager, weigh, {roll: 'x'} as never)),
    ).toBeRejected();
  });

  it('are each settled by themselves: one that fails takes no other with it', async () => {
    let tries = 0;
    run = ({roll}) => {
      if (roll !== 3) return Promise.resolve(void done.push(roll));
      tries += 1;
      return Promise.reject(new Error('no scale'));
    };
    for (const roll of [1, 2, 3, 4]) await send({roll});

    await withWorker(() => givenUp.length > 0);

    expect(done.sort()).toEqual([1, 2, 4]);
    expect(tries).toBe(2); // the first and the one of retryLimit
    expect(givenUp).toEqual([3]);
  });

  it('are taken up at once while there is work', async () => {
    run = async ({roll}) => {
      await new Promise((resolve) => setTimeout(resolve, 5));
      done.push(roll);
    };
    await server().db.transaction(async (manager) => {
      for (let roll = 0; roll < 200; roll++) await server().parts.jobs.send(manager, weigh, {roll});
    });
    const began = performance.now();

    await withWorker(() => done.length === 200);

    // Twenty batches of ten: one look each half second would take 9.5 s.
    expect(performance.now() - began).toBeLessThan(7000);
  });

  it('at work when the worker stops are done before it has stopped', async () => {
    let finish: () => void = () => undefined;
    let isBegun = false;
    run = async ({roll}) => {
      isBegun = true;
      await new Promise<void>((resolve) => (finish = resolve));
      done.push(roll);
    };
    await send({roll: 7});
    const worker = await startWorker([weigh], server().parts, UPKEEP_S);
    await waitFor(() => isBegun);

    const stopped = worker.stop();
    finish();
    await stopped;

    expect(done).toEqual([7]);
  });

  it('at work longer than a stop may take are given back', async () => {
    const {config, log} = server().parts;
    const boss = makeBoss({url: config.databaseUrl, log});
    await boss.start();
    let isBegun = false;
    const never = (): Promise<void> => {
      isBegun = true;
      return new Promise(() => undefined);
    };
    await send({roll: 8});
    const loop = new QueueLoop(boss, weigh.name, never, log);
    loop.start();
    await waitFor(() => isBegun);

    await loop.stop(20);
    await boss.stop({graceful: false});
    await withWorker(() => done.length > 0);

    expect(done).toEqual([8]);
  });
});

describe('a job whose worker is killed', () => {
  const server = useTestServer();
  const children: ChildProcess[] = [];
  afterAll(() => children.forEach((child) => child.kill('SIGKILL')));

  const startChild = (name: string): {child: ChildProcess; said: () => string} => {
    const child = spawn(
      process.execPath,
      ['--import', 'tsx', path.resolve('server/test-support/spec-worker.ts'), name],
      {env: {...process.env, SPEC_DATABASE_URL: server().parts.config.databaseUrl}},
    );
    children.push(child);
    let said = '';
    child.stdout.on('data', (chunk: Buffer) => (said += chunk.toString()));
    child.stderr.on('data', (chunk: Buffer) => (said += chunk.toString()));
    return {child, said: () => said};
  };

  it('is done by another', async () => {
    const {db, parts} = server();
    await makeQueues(parts.config.databaseUrl, [slowJob], parts.log);
    const first = startChild('first');
    await waitFor(() => first.said().includes('ready'), first.said);
    await db.transaction((manager) => parts.jobs.send(manager, slowJob, {}));
    await waitFor(() => first.said().includes('first begins'), first.said);

    first.child.kill('SIGKILL');
    const second = startChild('second');
    await waitFor(() => second.said().includes('second ends'), second.said);

    expect(first.said()).not.toContain('first ends');
  }, 30_000);
});

async function waitFor(isSo: () => boolean, tell: () => string = () => ''): Promise<void> {
  for (const end = Date.now() + 20_000; !isSo();) {
    if (Date.now() > end) throw new Error(`waited in vain ${tell()}`);
    await new Promise((resolve) => setTimeout(resolve, 10));
  }
}
