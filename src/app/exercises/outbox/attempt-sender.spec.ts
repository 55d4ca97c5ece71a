import {type Batch} from '#shared/attempts/attempt';
import {type LogEntry} from '#sim-core/index';
import {openPersonDatabase, type PersonDatabase} from '../../platform/person-database';
import {aFailure, AttemptServer} from '../test-support/attempt-server';
import {
  aKeptAttempt,
  anAnswer,
  aPersonId,
  aWhile,
  dropDatabases,
  until,
} from '../test-support/kept-here';
import {AttemptKeeper} from './attempt-keeper';
import {AttemptSender, type SenderState} from './attempt-sender';

describe('AttemptSender', () => {
  let server: AttemptServer;
  let database: PersonDatabase;
  let keeper: AttemptKeeper;
  let sender: AttemptSender;
  let states: SenderState[];
  let unsent: number;

  beforeEach(async () => {
    server = new AttemptServer();
    database = await openPersonDatabase(aPersonId());
    keeper = new AttemptKeeper(database, server.attemptId);
    await keeper.save(aKeptAttempt(server));
    jasmine.clock().install();
    states = [];
    sender = aSender();
  });

  afterEach(async () => {
    await sender.close();
    jasmine.clock().uninstall();
    database.close();
    await dropDatabases();
  });

  function aSender(): AttemptSender {
    return new AttemptSender({
      keeper,
      post: (batch) => server.sendBatch(server.attemptId, batch),
      tick: () => 0,
      told: (state, count) => {
        states.push(state);
        unsent = count;
      },
      handedIn: () => undefined,
      random: () => 0.5, // jitter × 1
    });
  }

  async function add(...entries: LogEntry[]): Promise<void> {
    for (const entry of entries) await keeper.add(entry);
    sender.wake();
  }

  const isTold = (kind: SenderState['kind']) => () => states.at(-1)?.kind === kind;
  const numbers = (): number[] => server.entries.map(({n}) => n);

  it('sends within two seconds of the first entry that waits', async () => {
    await add(anAnswer(1));
    jasmine.clock().tick(300);
    await add(anAnswer(2)); // does not put it off

    jasmine.clock().tick(1700);
    await until(isTold('idle'));

    expect(numbers()).toEqual([1, 2]);
    expect(server.arrived.length).toBe(1);
    expect(unsent).toBe(0);
  });

  it('repeats a batch to the byte when the answer was lost', async () => {
    server.losesAnswers = true;
    await add(anAnswer(1), anAnswer(2));
    jasmine.clock().tick(2000);
    await until(isTold('waiting'));
    await add(anAnswer(3)); // may not slip into the batch that was sent

    server.losesAnswers = false;
    jasmine.clock().tick(1000);
    await until(() => numbers().length === 3);

    expect(server.arrived[1]).toBe(server.arrived[0]);
    expect(numbers()).toEqual([1, 2, 3]);
  });

  it('brings 30 entries made offline in order once it is online again', async () => {
    server.isAway = true;
    await add(anAnswer(1));
    jasmine.clock().tick(2000);
    await until(isTold('waiting'));
    for (let n = 2; n <= 30; n++) await add(anAnswer(n));
    expect(server.arrived).toEqual([]);

    server.isAway = false;
    sender.hurry(); // at once, not after its pause
    jasmine.clock().tick(1);
    await until(isTold('idle'));

    expect(numbers()).toEqual(Array.from({length: 30}, (_, place) => place + 1));
    expect(unsent).toBe(0);
  });

  it('splits what is more than 64 kB or 500 entries, one request at a time', async () => {
    for (let n = 1; n <= 600; n++) await keeper.add(anAnswer(n, 'é'.repeat(100)));
    sender.wake();
    jasmine.clock().tick(2000);
    await until(isTold('idle'));

    const sizes = server.arrived.map((body) => new TextEncoder().encode(body).length);
    expect(sizes.length).toBeGreaterThan(2);
    expect(Math.max(...sizes)).toBeLessThanOrEqual(64_000);
    expect(server.mostAtOnce).toBe(1);
    expect(numbers()).toEqual(Array.from({length: 600}, (_, place) => place + 1));

    for (let n = 601; n <= 1200; n++) await keeper.add(anAnswer(n, ''));
    sender.wake();
    jasmine.clock().tick(2000);
    await until(() => numbers().length === 1200);
    const last = server.batches.slice(-2).map(({entries}) => entries.length);
    expect(last).toEqual([500, 100]);
  });

  it('waits 1, 2, 4 … 30 seconds between tries', async () => {
    server.isAway = true;
    await add(anAnswer(1));
    jasmine.clock().tick(700);
    for (const waitS of [1, 2, 4, 8, 16, 30, 30]) {
      await until(isTold('waiting'));
      await aWhile();
      states = [];
      jasmine.clock().tick(1000 * waitS - 1);
      await aWhile();
      expect(states).withContext(`before ${waitS} s`).toEqual([]);
      jasmine.clock().tick(1);
    }
    await until(isTold('waiting'));
    await aWhile();
    server.isAway = false;
    jasmine.clock().tick(30_000);
    await until(isTold('idle'));
  });

  for (const code of ['too-fast', 'unavailable', 'internal'] as const) {
    it(`tries again after ${code}`, async () => {
      server.refusals.push(aFailure(code));
      await add(anAnswer(1));
      jasmine.clock().tick(700);
      await until(isTold('waiting'));
      await aWhile();

      jasmine.clock().tick(1000);
      await until(isTold('idle'));

      expect(numbers()).toEqual([1]);
    });
  }

  it('waits as long as the server asks for', async () => {
    server.refusals.push(aFailure('too-many-requests', {retryAfterS: 20}));
    await add(anAnswer(1));
    jasmine.clock().tick(700);
    await until(isTold('waiting'));
    await aWhile();

    jasmine.clock().tick(19_999);
    await aWhile();
    expect(numbers()).toEqual([]);

    jasmine.clock().tick(1);
    await until(isTold('idle'));
    expect(numbers()).toEqual([1]);
  });

  for (const code of [
    'writer-changed',
    'batch-differs',
    'entry-refused',
    'not-signed-in',
  ] as const) {
    it(`stops at ${code}, keeps everything, and goes on only when somebody asks`, async () => {
      const refusal = aFailure(code);
      server.refusals.push(refusal);
      await add(anAnswer(1));
      jasmine.clock().tick(700);
      await until(isTold('stopped'));
      expect(states.at(-1)).toEqual({kind: 'stopped', failure: refusal});

      await add(anAnswer(2));
      sender.hurry();
      jasmine.clock().tick(60_000);
      await aWhile();
      expect(server.arrived.length).toBe(1);
      expect((await keeper.entries()).map(({n}) => n)).toEqual([1, 2]);

      sender.sendNow();
      jasmine.clock().tick(1);
      await until(() => numbers().length === 2);
    });
  }

  it('sends again what the server lost', async () => {
    const batches: Batch[] = [];
    for (const n of [1, 2, 3]) {
      await add(anAnswer(n));
      jasmine.clock().tick(700);
      await until(() => numbers().length === n);
      await until(isTold('idle'));
    }
    batches.push(...server.batches);
    server.batches = server.batches.slice(0, 1); // restored from yesterday

    await add(anAnswer(4));
    jasmine.clock().tick(700);
    await until(async () => {
      jasmine.clock().tick(1);
      return Promise.resolve(numbers().length === 4);
    });

    expect(server.batches.slice(0, 3)).toEqual(batches);
    expect(numbers()).toEqual([1, 2, 3, 4]);
  });

  it('stops when the server wants what comes after this', async () => {
    server.refusals.push(aFailure('batch-missing', {wanted: 5}));
    await add(anAnswer(1));
    jasmine.clock().tick(700);

    await until(isTold('stopped'));

    expect(server.arrived.length).toBe(1);
    expect(await keeper.countUnsent()).toBe(1);
  });

  it('sends nothing after it was closed', async () => {
    await add(anAnswer(1));

    await sender.close();
    jasmine.clock().tick(60_000);
    await aWhile();

    expect(server.arrived).toEqual([]);
  });
});
