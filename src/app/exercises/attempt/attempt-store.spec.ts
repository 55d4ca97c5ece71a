import {provideZonelessChangeDetection} from '@angular/core';
import {TestBed} from '@angular/core/testing';
import {replay} from '#sim-core/index';
import {LiveRun} from '../../live-run/live-run';
import {FramesByHand, plantHere} from '../../live-run/test-support/plant-here';
import {type PersonDatabase} from '../../platform/person-database';
import {Session} from '../../session/session';
import {ExerciseApi} from '../exercise-api';
import {AttemptKeeper} from '../outbox/attempt-keeper';
import {Outbox} from '../outbox/outbox';
import {AttemptServer} from '../test-support/attempt-server';
import {aKeptAttempt, aPersonId, dropDatabases, until, untilFree} from '../test-support/kept-here';
import {AttemptStore} from './attempt-store';

describe('AttemptStore', () => {
  let server: AttemptServer;
  let person: {id: string} | null;
  let outbox: Outbox;
  let database: PersonDatabase;
  let keeper: AttemptKeeper;
  let store: AttemptStore;
  const stores: AttemptStore[] = [];

  beforeEach(async () => {
    person = {id: aPersonId()};
    server = new AttemptServer();
    TestBed.configureTestingModule({
      providers: [
        provideZonelessChangeDetection(),
        {provide: ExerciseApi, useValue: server},
        {provide: Session, useValue: {me: () => person}},
      ],
    });
    outbox = TestBed.inject(Outbox);
    database = await outbox.database();
    keeper = new AttemptKeeper(database, server.attemptId);
    await keeper.save(aKeptAttempt(server));
    store = aStore();
  });

  afterEach(async () => {
    for (const each of stores.splice(0)) each.close();
    person = null;
    await outbox.sendWaiting();
    await untilFree(server.attemptId);
    database.close();
    await dropDatabases();
  });

  function aStore(): AttemptStore {
    const made = new AttemptStore(
      server,
      outbox,
      (record) => new LiveRun(record, plantHere, new FramesByHand()),
    );
    stores.push(made);
    return made;
  }

  /** The page is left and opened again. */
  async function openAgain(): Promise<void> {
    store.close();
    store = aStore();
    await store.open(server.attemptId);
  }

  async function runFor(seconds: number): Promise<void> {
    await store.run.advance(100 * seconds);
  }

  it('begins a new attempt without asking to continue', async () => {
    await store.open(server.attemptId);

    expect(store.stage()).toEqual({kind: 'ready', isResumed: false});
    expect(store.exercise()?.title).toBe('Stop gently');
  });

  it('keeps an act before it is shown, and sends it', async () => {
    await store.open(server.attemptId);

    await store.act({set: {kp: 0.3}});

    expect(store.run.entries().map(({kind}) => kind)).toEqual(['set']);
    expect((await keeper.entries()).map(({n}) => n)).toEqual([1]);
    await until(() => server.entries.length === 1);
    await until(() => store.unsent() === 0);
  });

  it('ends the run when this device can’t keep an act', async () => {
    await store.open(server.attemptId);
    spyOn(AttemptKeeper.prototype, 'add').and.rejectWith(
      new DOMException('full', 'QuotaExceededError'),
    );

    await store.act({set: {kp: 0.3}});

    expect(store.stage()).toEqual({kind: 'broken', why: 'notKept'});
    expect(store.run.entries()).toEqual([]);
  });

  it('goes on where it was left, paused, with the same run', async () => {
    await store.open(server.attemptId);
    store.goOn();
    await store.act({line: {command: 'run', speedMps: 2, rampS: 7}});
    await runFor(3);
    await store.act({set: {kp: 0.3}});
    await runFor(2);
    const hash = await store.run.hash();

    await openAgain();

    expect(store.stage()).toEqual({kind: 'ready', isResumed: true});
    expect(store.run.pauseReason()).toBe('notStarted');
    expect(store.run.view?.tick).toBe(500);
    expect(await store.run.hash()).toBe(hash);
  });

  it('goes on without a server, and sends when it is back', async () => {
    await store.open(server.attemptId);
    server.isAway = true;
    await store.act({set: {kp: 0.3}});
    await runFor(1);

    await openAgain();
    expect(store.stage()).toEqual({kind: 'ready', isResumed: true});
    expect(store.unsent()).toBe(1);
    await store.act({set: {kp: 0.4}});

    server.isAway = false;
    dispatchEvent(new Event('online'));
    await until(() => server.entries.length === 2);
    expect(server.entries.map(({n}) => n)).toEqual([1, 2]);
  });

  it('says that nothing is here of an attempt of another device, then begins at the server’s log', async () => {
    await store.open(server.attemptId);
    await store.act({set: {kp: 0.3}});
    await until(() => server.entries.length === 1);
    store.close();
    await keeper.forget();

    store = aStore();
    await store.open(server.attemptId);
    expect(store.stage().kind).toBe('otherDevice');

    await store.takeOver();
    expect(store.stage()).toEqual({kind: 'ready', isResumed: true});
    await store.act({set: {kp: 0.4}});
    await until(() => server.entries.length === 2);

    server.isAway = true; // what the other device wrote must be here by now
    await openAgain();
    expect(store.run.entries().map(({n}) => n)).toEqual([1, 2]);
  });

  it('stops when another device writes, and takes over with what it has', async () => {
    await store.open(server.attemptId);
    server.isAway = true;
    await store.act({set: {kp: 0.3}});
    await server.takeOver('', crypto.randomUUID()).catch(() => undefined);
    server.writerKey = crypto.randomUUID();
    server.isAway = false;

    await store.sendAgain();
    await until(() => store.stopped()?.code === 'writer-changed');
    expect(store.unsent()).toBe(1);

    await store.takeOver();
    await until(() => server.entries.length === 1);
    expect(store.stopped()).toBeNull();
    expect(store.run.entries().length).toBe(1);
  });

  it('learns at a nudge that another device writes, and stops the run', async () => {
    await store.open(server.attemptId);
    store.goOn();
    server.writerKey = crypto.randomUUID();

    store.lookForWriter();
    await until(() => store.stopped()?.code === 'writer-changed');

    expect(store.run.pauseReason()).toBe('over');
  });

  it('explains two versions, and sets its own aside when asked', async () => {
    await store.open(server.attemptId);
    server.isAway = true;
    await store.act({set: {kp: 0.3}});
    server.isAway = false;
    await server.sendBatch('', {
      writerKey: server.writerKey,
      number: 1,
      throughTick: 5,
      entries: [{n: 1, tick: 0, kind: 'set', set: {kp: 0.45}}],
    });

    await openAgain();
    expect(store.stage().kind).toBe('differs');
    expect((await keeper.entries()).length).toBe(1);

    await store.goOnWithServer();
    expect(store.stage().kind).toBe('ready');
    expect(store.run.settings()['kp']).toBe(0.45);
    expect((await database.getAll('setAside')).length).toBe(1);
  });

  it('hands in with the hash of the run, and forgets what the server has', async () => {
    await store.open(server.attemptId);
    store.goOn();
    await store.act({line: {command: 'run', speedMps: 2, rampS: 7}});
    await runFor(2);

    await store.handIn();
    await until(() => store.stage().kind === 'handedIn');

    const end = server.entries.at(-1);
    const {scenario} = server.document;
    const entries = store.run.entries();
    expect(end?.kind === 'end' && end.hash).toBe(replay(scenario, entries, 200).hash());
    await until(async () => (await keeper.read()) === undefined);
  });

  it('sends an end that an earlier visit kept', async () => {
    await store.open(server.attemptId);
    server.isAway = true;
    await store.handIn();
    await openAgain();
    expect(store.stage().kind).toBe('handingIn');

    server.isAway = false;
    await store.sendAgain();

    await until(() => store.stage().kind === 'handedIn');
    expect(server.state).toBe('handed-in');
  });

  it('shows the result of an attempt that was handed in elsewhere', async () => {
    server.state = 'handed-in';

    await store.open(server.attemptId);

    expect(store.stage().kind).toBe('handedIn');
  });

  it('refuses what the log has no room for, and still hands in', async () => {
    server.document.limits.entries = 2;
    await keeper.save(aKeptAttempt(server));
    await store.open(server.attemptId);

    for (const kp of [0.2, 0.3, 0.4]) await store.act({set: {kp}});
    expect(store.hasRoom()).toBeFalse();
    expect(store.run.entries().length).toBe(2);

    await store.handIn();
    await until(() => store.stage().kind === 'handedIn');
    expect(server.entries.map(({kind}) => kind)).toEqual(['set', 'set', 'end']);
  });

  it('ends a pause in the log that a closed tab left open', async () => {
    await store.open(server.attemptId);
    store.goOn();
    await runFor(1);
    store.pause();
    await until(() => store.run.entries().length === 1);

    await openAgain();
    store.goOn();
    await until(() => store.run.entries().length === 2);

    expect(store.run.entries().map(({kind}) => kind)).toEqual(['pause', 'resume']);
  });

  it('tells how far it is while it runs', async () => {
    await store.open(server.attemptId);

    await until(() => server.beats.length === 1);

    expect(server.beats).toEqual([0]);
  });
});
