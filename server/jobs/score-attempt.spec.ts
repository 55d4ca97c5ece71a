import {type LogEntry} from '#sim-core/index';
import {Attempt} from '#shared/attempts/attempt';
import {
  passingLog,
  untouchedLog,
  type WrittenLog,
} from '../demo/documents/stop-without-a-loop-logs';
import {publishExercise, sendBatch, startAttempt} from '../test-support/attempt-maker';
import {type SignedIn, useTestServer} from '../test-support/test-server';
import {scoreAttempt} from './score-attempt';
import {startWorker} from './worker';

describe('scoring an attempt', () => {
  const server = useTestServer();
  let trainee: SignedIn;
  let exerciseId: string;

  beforeAll(async () => {
    trainee = await server().signedInAs('trainee');
    exerciseId = await publishExercise(server(), trainee.caller);
  });
  afterAll(() => scoreAttempt.close?.());

  const handIn = async ({entries, throughTick}: WrittenLog): Promise<string> => {
    const made = await startAttempt(server(), trainee, exerciseId);
    await sendBatch(made, 1, entries, throughTick).expect(200);
    return made.id;
  };
  const read = async (id: string): Promise<Attempt> =>
    Attempt.parse((await trainee.agent.get(`/api/attempts/${id}`).expect(200)).body);
  const keyOf = (attemptId: string) => ({
    organisationId: trainee.caller.organisationId,
    attemptId,
  });

  it('passes the log that solves the exercise, and tells who waits for it', async () => {
    const worker = await startWorker([scoreAttempt], server().parts);
    const id = await handIn(passingLog());
    const deadline = Date.now() + 20_000;
    while ((await read(id)).state === 'handed-in' && Date.now() < deadline)
      await new Promise((resolve) => setTimeout(resolve, 100));
    await worker.stop();

    const {state, score, passed, result} = await read(id);
    expect([state, score, passed]).toEqual(['scored', 100, true]);
    expect(result?.hashAgrees).toBeTrue();
  });

  it('fails the start that nobody touched', async () => {
    const id = await handIn(untouchedLog());

    await scoreAttempt.run(keyOf(id), server().parts);

    expect((await read(id)).passed).toBeFalse();
  });

  it('gives one result, however often the job runs', async () => {
    const id = await handIn(passingLog());

    await scoreAttempt.run(keyOf(id), server().parts);
    const first = await read(id);
    await Promise.all([1, 2].map(() => scoreAttempt.run(keyOf(id), server().parts)));

    const rows: unknown[] = await server().db.query(
      'select id from attempt_result where attempt_id = $1',
      [id],
    );
    expect(rows.length).toBe(1);
    expect((await read(id)).score).toBe(first.score);
  });

  it('is by the stored log alone: another hash changes no score, and shows', async () => {
    const {entries, throughTick} = passingLog();
    const lying = entries.map((entry): LogEntry =>
      entry.kind === 'end' ? {...entry, hash: '0123456789abcdef'} : entry,
    );
    const id = await handIn({entries: lying, throughTick});

    await scoreAttempt.run(keyOf(id), server().parts);

    const {score, result} = await read(id);
    expect([score, result?.hashAgrees]).toEqual([100, false]);
    const told = server().logged.find((line) => line.includes('browser and replay differ'));
    expect(told).toContain(id);
  });
});
