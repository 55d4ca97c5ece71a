import {provideZonelessChangeDetection} from '@angular/core';
import {TestBed} from '@angular/core/testing';
import {Connection} from '../../platform/connection';
import {Session} from '../../session/session';
import {ExerciseApi} from '../exercise-api';
import {AttemptServer} from '../test-support/attempt-server';
import {
  aKeptAttempt,
  anAnswer,
  aPersonId,
  aWhile,
  dropDatabases,
  until,
} from '../test-support/kept-here';
import {AttemptKeeper} from './attempt-keeper';
import {holdAttempt} from './attempt-lock';
import {Outbox} from './outbox';

describe('Outbox', () => {
  let server: AttemptServer;
  let outbox: Outbox;
  let connection: Connection;
  let person: {id: string} | null;

  beforeEach(() => {
    server = new AttemptServer();
    person = {id: aPersonId()};
    TestBed.configureTestingModule({
      providers: [
        provideZonelessChangeDetection(),
        {provide: ExerciseApi, useValue: server},
        {provide: Session, useValue: {me: () => person}},
      ],
    });
    outbox = TestBed.inject(Outbox);
    connection = TestBed.inject(Connection);
  });

  afterEach(async () => {
    const database = person === null ? null : await outbox.database();
    person = null;
    await outbox.sendWaiting(); // lets everything go
    database?.close();
    await dropDatabases();
  });

  /** What an earlier visit left. */
  async function keep(...entries: number[]): Promise<AttemptKeeper> {
    const keeper = new AttemptKeeper(await outbox.database(), server.attemptId);
    await keeper.save(aKeptAttempt(server));
    for (const n of entries) await keeper.add(anAnswer(n));
    return keeper;
  }

  it('sends what an earlier visit left, whatever page is open', async () => {
    await keep(1, 2);

    await outbox.sendWaiting();
    await until(() => server.entries.length === 2);
  });

  it('hands over an attempt whose end waited, and forgets it', async () => {
    const keeper = await keep(1);
    await keeper.add({n: 2, tick: 40, kind: 'end', hash: '0123456789abcdef'});

    await outbox.sendWaiting();
    await until(() => server.state === 'handed-in');
    await until(async () => (await keeper.read()) === undefined);

    expect(await outbox.keptAttempts()).toEqual([]);
  });

  it('tells the shell what did not go, and when it went', async () => {
    await keep(1, 2, 3);
    server.isAway = true;

    await outbox.sendWaiting();
    await until(() => connection.entriesWaiting() === 3);

    server.isAway = false;
    dispatchEvent(new Event('online'));
    await until(() => connection.entriesWaiting() === 0);
    expect(server.entries.length).toBe(3);
  });

  it('does not send an attempt that another tab has', async () => {
    await keep(1);
    const letGo = (await holdAttempt(server.attemptId))!;

    expect(await outbox.hold(server.attemptId)).toBeNull();
    await outbox.sendWaiting();
    await aWhile();
    expect(server.arrived).toEqual([]);

    letGo();
    await until(async () => (await outbox.hold(server.attemptId)) !== null);
    await until(() => server.entries.length === 1);
  });

  it('goes on sending after the page was left, then lets other tabs have it', async () => {
    await keep();
    server.isAway = true;
    const held = (await outbox.hold(server.attemptId))!;
    await held.add(anAnswer(1));
    outbox.leave(server.attemptId);
    expect(await holdAttempt(server.attemptId)).toBeNull();

    server.isAway = false;
    await until(() => server.entries.length === 1);

    await until(async () => {
      const letGo = await holdAttempt(server.attemptId);
      letGo?.();
      return letGo !== null;
    });
  });

  it('gives one page what it already sends in the background', async () => {
    await keep(1);
    server.isAway = true;

    await outbox.sendWaiting();
    const [one, other] = await Promise.all([
      outbox.hold(server.attemptId),
      outbox.hold(server.attemptId),
    ]);

    expect(one).not.toBeNull();
    expect(other).toBe(one);
  });

  it('sends nothing more of a person who signed out', async () => {
    await keep(1);
    server.isAway = true;
    await outbox.sendWaiting();
    const database = await outbox.database();

    person = null;
    await outbox.sendWaiting();
    server.isAway = false;
    dispatchEvent(new Event('online'));
    await aWhile();

    expect(server.arrived).toEqual([]);
    expect(connection.entriesWaiting()).toBe(0);
    database.close();
  });
});
