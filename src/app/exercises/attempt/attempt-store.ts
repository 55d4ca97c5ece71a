import {computed, DestroyRef, inject, Injectable, signal} from '@angular/core';
import {type Act, type Scenario} from '#sim-core/index';
import {LiveRun} from '../../live-run/live-run';
import {type ApiFailure, toApiFailure} from '../../platform/api-failure';
import {BuildCheck} from '../../platform/build-check';
import {Connection} from '../../platform/connection';
import {
  type KeptAttempt,
  openPersonDatabase,
  type PersonDatabase,
} from '../../platform/person-database';
import {Session} from '../../session/session';
import {ExerciseApi} from '../exercise-api';
import {AttemptKeeper} from '../outbox/attempt-keeper';
import {holdAttempt} from '../outbox/attempt-lock';
import {AttemptSender, type SenderState} from '../outbox/attempt-sender';
import {joinLogs, type TakenUp} from './take-up';

const NOTE_TICK_MS = 1000;

/** Where the page stands: what it shows. */
export type Stage =
  | {readonly kind: 'loading'}
  | {readonly kind: 'failed'; readonly failure: ApiFailure}
  | {readonly kind: 'otherTab'}
  | {readonly kind: 'otherDevice'}
  | {readonly kind: 'differs'}
  | {readonly kind: 'ready'; readonly isResumed: boolean}
  | {readonly kind: 'handingIn'}
  | {readonly kind: 'handedIn'};

/** One attempt while it is run: the run, what is kept here, and its way to the server. */
@Injectable()
export class AttemptStore {
  private readonly api = inject(ExerciseApi);
  private readonly session = inject(Session);
  private readonly connection = inject(Connection);

  readonly run = new LiveRun((entry) => this.keep(entry));

  private readonly stageNow = signal<Stage>({kind: 'loading'});
  private readonly senderNow = signal<SenderState>({kind: 'idle'});
  private readonly kept = signal<KeptAttempt | null>(null);

  readonly stage = this.stageNow.asReadonly();
  readonly sender = this.senderNow.asReadonly();
  readonly exercise = computed(() => this.kept()?.document ?? null);
  readonly unsent = this.connection.entriesWaiting;

  private keeper: AttemptKeeper | null = null;
  private sending: AttemptSender | null = null;
  private letGo: (() => void) | null = null;
  private beatTimer: ReturnType<typeof setTimeout> | undefined;

  constructor() {
    const letReload = inject(BuildCheck).holdDuringRun();
    const noteTimer = setInterval(() => void this.noteTick(), NOTE_TICK_MS);
    const sendNow = (): void => this.sending?.sendNow();
    addEventListener('online', sendNow);
    inject(DestroyRef).onDestroy(() => {
      removeEventListener('online', sendNow);
      clearInterval(noteTimer);
      clearTimeout(this.beatTimer);
      void this.noteTick();
      this.sending?.close();
      this.run.close();
      this.letGo?.();
      letReload();
    });
  }

  /** Takes the attempt up where it is: server's log, this device's entries, the last tick shown. */
  async open(attemptId: string): Promise<void> {
    this.stageNow.set({kind: 'loading'});
    try {
      this.letGo ??= await holdAttempt(attemptId);
      if (this.letGo === null) this.stageNow.set({kind: 'otherTab'});
      else await this.takeUp(attemptId, await this.database());
    } catch (error) {
      this.stageNow.set({kind: 'failed', failure: toApiFailure(error)}); // offline, not found …
    }
  }

  /** Goes on here; the other device is told when it next writes. */
  async takeOver(attemptId: string): Promise<void> {
    try {
      const writerKey = crypto.randomUUID();
      const attempt = await this.api.takeOver(attemptId, writerKey);
      const keeper = new AttemptKeeper(await this.database(), attemptId);
      await keeper.forget(); // the server's log counts from here on
      await keeper.save({
        id: attempt.id,
        exerciseId: attempt.exercise.id,
        writerKey,
        document: attempt.exerciseDocument,
        seed: attempt.seed,
        ackedBatch: attempt.lastBatch,
        throughTick: attempt.throughTick,
      });
      await this.open(attemptId);
    } catch (error) {
      this.stageNow.set({kind: 'failed', failure: toApiFailure(error)});
    }
  }

  act(act: Act): Promise<unknown> {
    return this.run.act(act);
  }

  goOn(): void {
    const reason = this.run.pauseReason();
    if (reason === 'byPerson') void this.run.note({kind: 'resume'});
    this.run.resume();
  }

  pause(): void {
    void this.run.note({kind: 'pause'});
    this.run.halt('byPerson');
  }

  setFactor(factor: number): void {
    this.run.setFactor(factor);
    void this.run.note({kind: 'factor', factor});
  }

  /** Hands in: the `end` entry is kept, then everything goes to the server. */
  async handIn(): Promise<void> {
    this.stageNow.set({kind: 'handingIn'});
    await this.run.end();
    this.sending?.sendNow();
  }

  retrySending(): void {
    this.sending?.sendNow();
  }

  private async takeUp(attemptId: string, database: PersonDatabase): Promise<void> {
    const keeper = new AttemptKeeper(database, attemptId);
    const here = await keeper.read();
    const server = await this.readServer(attemptId, here !== undefined);
    if (server !== null && server.attempt.state !== 'running') {
      await keeper.forget();
      this.stageNow.set({kind: 'handedIn'});
      return;
    }
    if (here === undefined) {
      this.stageNow.set({kind: 'otherDevice'});
      return;
    }
    const kept = {entries: await keeper.entries(), throughTick: here.throughTick};
    const joined = server === null ? kept : joinLogs({server: server.log, here: kept});
    if (joined === null) {
      this.stageNow.set({kind: 'differs'});
      return;
    }
    if (server !== null) await keeper.acknowledge(server.log.lastBatch);
    await this.goOnFrom(keeper, here, joined);
  }

  /** What the server has; null without a connection, when this device can go on by itself. */
  private async readServer(attemptId: string, isKeptHere: boolean) {
    try {
      const [attempt, log] = await Promise.all([
        this.api.attempt(attemptId),
        this.api.log(attemptId),
      ]);
      return {attempt, log};
    } catch (error) {
      const failure = toApiFailure(error);
      if (failure.code === 'offline' && isKeptHere) return null;
      throw failure;
    }
  }

  private async goOnFrom(keeper: AttemptKeeper, here: KeptAttempt, log: TakenUp): Promise<void> {
    this.keeper = keeper;
    this.kept.set(here);
    const document: Scenario = {...here.document.scenario, seed: here.seed};
    await this.run.start({document, handOverS: here.document.handOverS, ...log});
    this.startSending(here.id, keeper, here.writerKey);
    // An `end` that was kept but not sent: the attempt only has to go out.
    const isEnded = log.entries.at(-1)?.kind === 'end';
    if (isEnded) this.run.halt('over');
    this.stageNow.set(
      isEnded ? {kind: 'handingIn'} : {kind: 'ready', isResumed: log.throughTick > 0},
    );
  }

  private startSending(attemptId: string, keeper: AttemptKeeper, writerKey: string): void {
    this.sending?.close();
    this.sending = new AttemptSender({
      keeper,
      post: (batch) => this.api.sendBatch(attemptId, batch),
      tick: () => this.run.view?.tick ?? 0,
      told: (state, unsent) => {
        this.senderNow.set(state);
        this.connection.setEntriesWaiting(unsent);
      },
      handedIn: () => {
        this.connection.setEntriesWaiting(0);
        void keeper.forget();
        this.stageNow.set({kind: 'handedIn'});
      },
    });
    this.sending.sendNow();
    this.beatLater(attemptId, writerKey, 10);
  }

  private beatLater(attemptId: string, writerKey: string, seconds: number): void {
    clearTimeout(this.beatTimer);
    this.beatTimer = setTimeout(() => void this.beat(attemptId, writerKey), seconds * 1000);
  }

  private async beat(attemptId: string, writerKey: string): Promise<void> {
    let nextS = 10;
    const isRunning = this.run.pauseReason() === null && this.connection.isOnline();
    if (isRunning) {
      try {
        const reply = await this.api.sendBeat(attemptId, writerKey, this.run.view?.tick ?? 0);
        nextS = reply.nextBeatS;
      } catch {
        // ApiFailure: a beat that is lost costs nothing; batches tell what is wrong
      }
    }
    this.beatLater(attemptId, writerKey, nextS);
  }

  private async keep(entry: Parameters<AttemptKeeper['add']>[0]): Promise<void> {
    await this.keeper?.add(entry);
    this.connection.setEntriesWaiting((await this.keeper?.countUnsent()) ?? 0);
    this.sending?.wake();
  }

  private async noteTick(): Promise<void> {
    const tick = this.run.view?.tick;
    if (tick !== undefined && this.stageNow().kind === 'ready') await this.keeper?.noteTick(tick);
  }

  private database(): Promise<PersonDatabase> {
    return openPersonDatabase(this.session.me()?.id ?? 'nobody');
  }
}
