import {type LogEntry} from '#sim-core/index';
import {STOP_WITHOUT_A_LOOP} from '../demo/documents/stop-without-a-loop';
import {passingLog} from '../demo/documents/stop-without-a-loop-logs';
import {type ReplayWork} from './replay';
import {ReplayPool} from './replay-pool';

/** An hour of simulated time: more than a millisecond's work on any machine. */
const HOUR_TICKS = 360_000;
const end = (tick: number): LogEntry => ({n: 1, tick, kind: 'end', hash: '0'.repeat(16)});
const long: ReplayWork = {
  exercise: STOP_WITHOUT_A_LOOP,
  entries: [end(HOUR_TICKS)],
  throughTick: HOUR_TICKS,
};

describe('the threads that run logs again', () => {
  let pool: ReplayPool;
  afterEach(() => pool.close());

  it('give the score and the hash that the run had', async () => {
    pool = new ReplayPool();
    const {entries, throughTick} = passingLog();

    const answer = await pool.run({exercise: STOP_WITHOUT_A_LOOP, entries, throughTick});

    const told = entries.at(-1);
    if (answer.kind !== 'scored' || told?.kind !== 'end') throw new Error('no score');
    expect(answer.hash).toBe(told.hash);
    expect(answer.score.passed).toBeTrue();
  });

  it('have another hash when one entry is moved by one tick', async () => {
    pool = new ReplayPool();
    const {entries, throughTick} = passingLog();
    const moved = entries.map((entry, index) =>
      index === 1 ? {...entry, tick: entry.tick + 1} : entry,
    );

    const answers = [
      await pool.run({exercise: STOP_WITHOUT_A_LOOP, entries, throughTick}),
      await pool.run({exercise: STOP_WITHOUT_A_LOOP, entries: moved, throughTick}),
    ];

    const hashes = answers.map((answer) => (answer.kind === 'scored' ? answer.hash : 'refused'));
    expect(hashes[0]).not.toBe(hashes[1]);
    expect(hashes).not.toContain('refused');
  });

  it('say why the engine does not take a log', async () => {
    pool = new ReplayPool();
    const wrong: LogEntry = {n: 1, tick: 5, kind: 'set', set: {outMinPct: 100}};

    const answer = await pool.run({...long, entries: [wrong], throughTick: 10});

    expect(answer.kind).toBe('refused');
    expect((answer as {reason: string}).reason).toContain('outMaxPct');
  });

  it('end a run that takes too long, and go on with the next', async () => {
    pool = new ReplayPool(1);

    const replies = await Promise.allSettled([pool.run(long), pool.run(long)]);

    for (const reply of replies) {
      expect(reply.status).toBe('rejected');
      expect(String((reply as PromiseRejectedResult).reason)).toContain('(replay-limit)');
    }
    await pool.close();
    pool = new ReplayPool();
    expect((await pool.run({...long, entries: [end(10)], throughTick: 10})).kind).toBe('scored');
  });
});
