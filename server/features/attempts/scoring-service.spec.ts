import {passingLog} from '../../demo/documents/stop-without-a-loop-logs';
import {type ReplayAnswer, ReplayLimitError, type Replayer} from '../../jobs/replay';
import {scoreAttempt} from '../../jobs/score-attempt';
import {startWorker} from '../../jobs/worker';
import {publishExercise, sendBatch, startAttempt} from '../../test-support/attempt-maker';
import {type SignedIn, useTestServer} from '../../test-support/test-server';
import {type AttemptKey, ScoringService} from './scoring-service';

const scored: ReplayAnswer = {
  kind: 'scored',
  score: {score: 71.5, passed: true, criteria: []},
  hash: '0'.repeat(16),
  engine: 1,
};
const tooLong: Replayer = () => Promise.reject(new ReplayLimitError('it took more than 5000 ms'));

describe('an attempt that was handed in', () => {
  const server = useTestServer();
  let trainee: SignedIn;
  let key: AttemptKey;

  beforeAll(async () => (trainee = await server().signedInAs('trainee')));
  afterAll(() => scoreAttempt.close?.());

  const handIn = async (exerciseId: string, entries: readonly object[]): Promise<void> => {
    const made = await startAttempt(server(), trainee, exerciseId);
    await sendBatch(made, 1, entries).expect(200);
    key = {organisationId: trainee.caller.organisationId, attemptId: made.id};
  };
  beforeEach(async () => {
    const exerciseId = await publishExercise(server(), trainee.caller);
    await handIn(exerciseId, passingLog().entries);
  });

  const scoring = () => new ScoringService(server().parts);
  const read = async () => {
    const {body} = await trainee.agent.get(`/api/attempts/${key.attemptId}`).expect(200);
    const {state, score, passed, failure} = body as Record<string, unknown>;
    return {state, score, passed, failure};
  };

  it('waits while the scoring is tried again, and fails with the reason when it is given up', async () => {
    await expectAsync(scoring().score(key, tooLong)).toBeRejectedWithError(/replay-limit/);
    expect((await read()).state).toBe('handed-in');
    expect((await read()).failure).toBeNull();

    await scoring().giveUp(key);

    const {state, failure} = await read();
    expect(state).toBe('failed');
    expect(failure).toBe(
      'The run could not be run again: it took more than 5000 ms (replay-limit).',
    );
  });

  it('fails in plain words when a thread broke, without those of the error', async () => {
    const broken: Replayer = () => Promise.reject(new Error('a secret of the inside'));
    await expectAsync(scoring().score(key, broken)).toBeRejected();

    await scoring().giveUp(key);

    expect((await read()).failure).toMatch(/^The run could not be scored\. It is kept/);
  });

  it('is scored by a later job all the same, and no failure takes that back', async () => {
    await scoring().giveUp(key);

    await scoring().score(key, () => Promise.resolve(scored));
    await scoring().giveUp(key);
    await scoring().score(key, () => Promise.resolve({kind: 'refused', reason: 'late'}));

    expect(await read()).toEqual({state: 'scored', score: 71.5, passed: true, failure: null});
  });

  it('keeps one result for each engine, and shows the one it was scored with last', async () => {
    await scoring().score(key, () => Promise.resolve(scored));
    const newer = {...scored, engine: 2, score: {...scored.score, score: 70}};
    await scoring().score(key, () => Promise.resolve(newer));
    await scoring().score(key, () => Promise.resolve(newer));

    const rows: {engine: number; score: number}[] = await server().db.query(
      'select engine, score from attempt_result where attempt_id = $1 order by engine',
      [key.attemptId],
    );
    expect(rows).toEqual([
      {engine: 1, score: 71.5},
      {engine: 2, score: 70},
    ]);
    expect((await read()).score).toBe(70);
  });

  it('is given with its own seed and the whole log to the replay, and nothing else of the client', async () => {
    await server().db.query('update attempt set seed = 4294967295 where id = $1', [key.attemptId]);
    let given: Parameters<Replayer>[0] | undefined;

    await scoring().score(key, (work) => {
      given = work;
      return Promise.resolve(scored);
    });

    const {entries, throughTick} = passingLog();
    expect(given?.exercise.scenario.seed).toBe(4294967295);
    expect(given?.entries).toEqual(entries);
    expect(given?.throughTick).toBe(throughTick);
  });

  it('does nothing to one that still runs, or is not there', async () => {
    const exerciseId = await publishExercise(server(), trainee.caller);
    const {id} = await startAttempt(server(), trainee, exerciseId);
    const [organisationId, other] = [key.organisationId, await server().organisation()];

    await scoring().score({organisationId, attemptId: id}, tooLong);
    await scoring().score({organisationId: other, attemptId: key.attemptId}, tooLong);
    await scoring().giveUp({organisationId: other, attemptId: key.attemptId});

    expect((await read()).state).toBe('handed-in');
  });

  it('fails at once when the engine does not take its log', async () => {
    // Each value is in its range; lowest above highest is seen by the engine alone.
    const exerciseId = await publishExercise(server(), trainee.caller, {
      number: 60,
      touch: {settings: [{key: 'outMinPct'}], commands: []},
    });
    await handIn(exerciseId, [
      {n: 1, tick: 5, kind: 'set', set: {outMinPct: 100}},
      {n: 2, tick: 10, kind: 'end', hash: '0'.repeat(16)},
    ]);

    const worker = await startWorker([scoreAttempt], server().parts);
    for (const until = Date.now() + 20_000; Date.now() < until;) {
      if ((await read()).state !== 'handed-in') break;
      await new Promise((resolve) => setTimeout(resolve, 50));
    }
    await worker.stop();

    const {state, failure} = await read();
    expect(state).toBe('failed');
    expect(failure).toContain('outMaxPct');
  });
});
