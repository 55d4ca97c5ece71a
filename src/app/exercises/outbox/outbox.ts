import {inject, Injectable} from '@angular/core';
import {Connection} from '../../platform/connection';
import {
  type KeptAttempt,
  openPersonDatabase,
  type PersonDatabase,
} from '../../platform/person-database';
import {Session} from '../../session/session';
import {ExerciseApi} from '../exercise-api';
import {AttemptKeeper} from './attempt-keeper';
import {holdAttempt} from './attempt-lock';
import {HeldAttempt} from './held-attempt';

interface Held {
  readonly attempt: HeldAttempt;
  readonly letGo: () => void;
  /** Whether a page runs it; without one it is let go as soon as nothing waits. */
  isOnPage: boolean;
}

/** Everything of this person that waits on this device, and its way to the server. */
@Injectable({providedIn: 'root'})
export class Outbox {
  private readonly api = inject(ExerciseApi);
  private readonly connection = inject(Connection);
  private readonly session = inject(Session);

  private readonly held = new Map<string, Promise<Held | null>>();
  private readonly ready = new Map<string, Held>();
  private opened: {readonly personId: string; readonly database: Promise<PersonDatabase>} | null =
    null;

  constructor() {
    addEventListener('online', () => {
      for (const {attempt} of this.ready.values()) attempt.hurry();
    });
  }

  /** Sends what waits from earlier visits; lets everything go when somebody else is signed in, or nobody. */
  async sendWaiting(): Promise<void> {
    const personId = this.personId();
    if (this.opened !== null && this.opened.personId !== personId) await this.letAllGo();
    if (personId === null) return;
    for (const {id} of await this.keptAttempts()) {
      const keeper = new AttemptKeeper(await this.database(), id);
      if ((await keeper.countUnsent()) > 0) await this.reach(id, false);
    }
  }

  /** Holds an attempt for a page of this tab; null when another tab has it. Call `leave` at the end. */
  async hold(attemptId: string): Promise<HeldAttempt | null> {
    const held = await this.reach(attemptId, true);
    return held?.attempt ?? null;
  }

  /** The page is left: what waits is still sent. */
  leave(attemptId: string): void {
    const held = this.ready.get(attemptId);
    if (held === undefined) return;
    held.isOnPage = false;
    this.changed(attemptId);
  }

  /** Attempts that this device can go on with. */
  async keptAttempts(): Promise<KeptAttempt[]> {
    return (await this.database()).getAll('attempts');
  }

  /** The signed-in person's part of this device. */
  database(): Promise<PersonDatabase> {
    const personId = this.personId();
    if (personId === null) throw new Error('nobody is signed in');
    if (this.opened?.personId !== personId) {
      this.opened = {personId, database: openPersonDatabase(personId)};
    }
    return this.opened.database;
  }

  private async reach(attemptId: string, isForPage: boolean): Promise<Held | null> {
    let reaching = this.held.get(attemptId);
    if (reaching === undefined) {
      reaching = this.take(attemptId, isForPage);
      this.held.set(attemptId, reaching);
    }
    const held = await reaching;
    if (held === null) this.held.delete(attemptId);
    else if (isForPage) held.isOnPage = true;
    return held;
  }

  private async take(attemptId: string, isOnPage: boolean): Promise<Held | null> {
    const letGo = await holdAttempt(attemptId);
    if (letGo === null) return null;
    const attempt = new HeldAttempt({
      keeper: new AttemptKeeper(await this.database(), attemptId),
      post: (batch) => this.api.sendBatch(attemptId, batch),
      changed: () => this.changed(attemptId),
    });
    const held = {attempt, letGo, isOnPage};
    this.ready.set(attemptId, held);
    await attempt.sendWaiting();
    return held;
  }

  private changed(attemptId: string): void {
    const held = this.ready.get(attemptId);
    if (held !== undefined) {
      const {attempt, isOnPage} = held;
      if (attempt.isHandedIn()) void attempt.keeper.forget();
      if (!isOnPage && attempt.unsent() === 0) void this.letGo(attemptId, held);
    }
    let waiting = 0;
    for (const {attempt} of this.ready.values()) waiting += attempt.late();
    this.connection.setEntriesWaiting(waiting);
  }

  private async letGo(attemptId: string, held: Held): Promise<void> {
    this.ready.delete(attemptId);
    this.held.delete(attemptId);
    await held.attempt.close();
    held.letGo();
  }

  private async letAllGo(): Promise<void> {
    for (const [attemptId, held] of [...this.ready]) await this.letGo(attemptId, held);
    this.opened = null;
    this.connection.setEntriesWaiting(0);
  }

  private personId(): string | null {
    return this.session.me()?.id ?? null;
  }
}
