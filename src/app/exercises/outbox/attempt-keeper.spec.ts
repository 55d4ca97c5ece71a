import {openPersonDatabase, type PersonDatabase} from '../../platform/person-database';
import {AttemptServer} from '../test-support/attempt-server';
import {aKeptAttempt, anAnswer, aPersonId, dropDatabases} from '../test-support/kept-here';
import {AttemptKeeper} from './attempt-keeper';

describe('AttemptKeeper', () => {
  const server = new AttemptServer();
  let personId: string;
  let database: PersonDatabase;
  let keeper: AttemptKeeper;

  beforeEach(async () => {
    personId = aPersonId();
    database = await openPersonDatabase(personId);
    keeper = new AttemptKeeper(database, server.attemptId);
    await keeper.save(aKeptAttempt(server));
  });

  afterEach(async () => {
    database.close();
    await dropDatabases();
  });

  describe('fixing a batch', () => {
    it('gives the same batch until it is acknowledged, whatever was added meanwhile', async () => {
      await keeper.add(anAnswer(1));
      const first = await keeper.nextBatch(50);
      await keeper.add(anAnswer(2));

      expect(await keeper.nextBatch(90)).toEqual(first);
      expect(first?.entries.map(({n}) => n)).toEqual([1]);

      await keeper.acknowledge(1);
      const second = await keeper.nextBatch(90);
      expect(second?.number).toBe(2);
      expect(second?.entries.map(({n}) => n)).toEqual([2]);
    });

    it('gives the same bytes after the tab was closed and opened again', async () => {
      await keeper.add({n: 1, tick: 4, kind: 'set', set: {kp: 0.2, tiS: 0.5}});
      const before = JSON.stringify(await keeper.nextBatch(50));
      database.close();

      database = await openPersonDatabase(personId);
      const again = new AttemptKeeper(database, server.attemptId);

      expect(JSON.stringify(await again.nextBatch(800))).toBe(before);
    });

    it('claims how far the run was shown', async () => {
      await keeper.add(anAnswer(1));
      await keeper.noteTick(70);
      await keeper.noteTick(60); // never back

      expect((await keeper.nextBatch(0))?.throughTick).toBe(70);
    });

    it('claims no more than the end of an attempt', async () => {
      await keeper.noteTick(900);
      await keeper.add({n: 1, tick: 40, kind: 'end', hash: '0123456789abcdef'});

      expect((await keeper.nextBatch(900))?.throughTick).toBe(40);
    });

    it('claims no tick beyond entries that come in the next batch', async () => {
      for (let n = 1; n <= 501; n++) await keeper.add(anAnswer(n));

      const batch = await keeper.nextBatch(99_999);

      expect(batch?.entries.length).toBe(500);
      expect(batch?.throughTick).toBe(5000);
    });

    it('writes under the newest key, with the same entries', async () => {
      await keeper.add(anAnswer(1));
      const batch = await keeper.nextBatch(50);

      await keeper.useWriterKey('another');

      expect(await keeper.nextBatch(50)).toEqual({...batch!, writerKey: 'another'});
    });
  });

  it('counts what only this device has', async () => {
    for (const n of [1, 2, 3]) await keeper.add(anAnswer(n));
    await keeper.nextBatch(0);
    await keeper.add(anAnswer(4));
    expect(await keeper.countUnsent()).toBe(4);

    await keeper.acknowledge(1);
    expect(await keeper.countUnsent()).toBe(1);
  });

  it('keeps sent batches, so that a server that lost them can have them again', async () => {
    await keeper.add(anAnswer(1));
    const first = await keeper.nextBatch(0);
    await keeper.acknowledge(1);

    await keeper.rewindTo(1);

    expect(await keeper.nextBatch(0)).toEqual(first);
  });

  it('gives all entries in order: base, batches, then what waits', async () => {
    await keeper.useBase([anAnswer(1)]);
    await keeper.add(anAnswer(2));
    await keeper.nextBatch(0);
    await keeper.add(anAnswer(3));

    expect((await keeper.entries()).map(({n}) => n)).toEqual([1, 2, 3]);
  });

  it('sets entries aside without throwing them away', async () => {
    await keeper.add(anAnswer(1));

    await keeper.setAside('2026-03-02T08:00:00.000Z');

    expect(await keeper.read()).toBeUndefined();
    expect(await keeper.countUnsent()).toBe(0);
    expect((await database.getAll('setAside')).map(({entries}) => entries)).toEqual([
      [anAnswer(1)],
    ]);
  });

  it('forgets its own attempt only', async () => {
    const other = new AttemptServer();
    const otherKeeper = new AttemptKeeper(database, other.attemptId);
    await otherKeeper.save(aKeptAttempt(other));
    await otherKeeper.add(anAnswer(1));
    await keeper.add(anAnswer(1));

    await keeper.forget();

    expect(await keeper.entries()).toEqual([]);
    expect(await otherKeeper.countUnsent()).toBe(1);
  });
});
