import {computed, signal} from '@angular/core';
import {type Act, type LogEntry, type Note, type Scenario} from '#sim-core/index';
import {LiveRun, type Recorder} from '../../live-run/live-run';
import {type ApiFailure, toApiFailure} from '../../platform/api-failure';
import {type KeptAttempt} from '../../platform/person-database';
import {type ExerciseApi} from '../exercise-api';
import {type HeldAttempt} from '../outbox/held-attempt';
import {type Outbox} from '../outbox/outbox';
import {Beat} from './beat';
import {openAttempt} from './open-attempt';
import {type TakenUp} from './take-up';
import {writeFromHere} from './write-from-here';

const NOTE_TICK_MS = 250;

/** Where the page stands: what it shows. */
export type Stage =
  | {readonly kind: 'loading' | 'otherTab' | 'otherDevice' | 'differs'}
  | {readonly kind: 'failed'; readonly failure: ApiFailure}
  /** The run can't go on here, though what was kept is safe. */
  | {readonly kind: 'broken'; readonly why: 'notKept' | 'stopped'}
  | {readonly kind: 'ready'; readonly isResumed: boolean}
  | {readonly kind: 'handingIn' | 'handedIn'};

type Api = Pick<ExerciseApi, 'attempt' | 'log' | 'sendBeat' | 'takeOver'>;

/** One attempt while it is run: the run, what is kept here, and its way to the server. */
export class AttemptStore {
  readonly run: LiveRun;

  private readonly stageNow = signal<Stage>({kind: 'loading'});
  private readonly kept = signal<KeptAttempt | null>(null);
  private readonly held = signal<HeldAttempt | null>(null);

  readonly stage = computed<Stage>(() => {
    if (this.held()?.isHandedIn() === true) return {kind: 'handedIn'};
    const stage = this.stageNow();
    const hasStopped = stage.kind === 'ready' && this.run.failure() !== null;
    return hasStopped ? {kind: 'broken', why: 'stopped'} : stage;
  });
  readonly exercise = computed(() => this.kept()?.document ?? null);
  readonly unsent = computed(() => this.held()?.unsent() ?? 0);
  /** Why nothing more is sent until somebody decides. */
  readonly stopped = computed(() => {
    const sending = this.held()?.sending();
    return sending?.kind === 'stopped' ? sending.failure : null;
  });
  /** Whether the log has room for another entry beside the end. */
  readonly hasRoom = computed(
    () => this.run.entries().length < (this.exercise()?.limits.entries ?? Infinity),
  );

  private beat: Beat | null = null;
  private readonly noteTimer = setInterval(() => void this.noteTick(), NOTE_TICK_MS);
  private attemptId = '';
  /** What was last noted: while time stands the disk is left alone. */
  private notedTick = -1;
  private isClosed = false;

  constructor(
    private readonly api: Api,
    private readonly outbox: Outbox,
    makeRun: (record: Recorder) => LiveRun = (record) => new LiveRun(record),
  ) {
    this.run = makeRun((entry) => this.keep(entry));
  }

  /** Takes the attempt up where it is: server's log, this device's entries, the last tick shown. */
  async open(attemptId: string): Promise<void> {
    this.attemptId = attemptId;
    this.notedTick = -1;
    this.stageNow.set({kind: 'loading'});
    await this.orFail(async () => {
      const held = await this.outbox.hold(attemptId);
      if (this.isClosed) this.outbox.leave(attemptId);
      else if (held === null) this.stageNow.set({kind: 'otherTab'});
      else await this.takeUp(held);
    });
  }

  /** Goes on here with what both sides have; the other device is told when it next writes. */
  async takeOver(): Promise<void> {
    this.stageNow.set({kind: 'loading'});
    await this.orFail(async () => {
      const held = await this.outbox.hold(this.attemptId);
      if (held === null) this.stageNow.set({kind: 'otherTab'});
      else if (await writeFromHere(this.api, held.keeper)) await this.takeUp(held);
      else this.stageNow.set({kind: 'handedIn'});
    });
  }

  /** Goes on with the server's log; what this device has more is set aside. */
  async goOnWithServer(): Promise<void> {
    await this.held()?.keeper.setAside(new Date().toISOString());
    await this.takeOver();
  }

  /** Resolves when the act is kept, or refused (see `run.faults`). */
  async act(act: Act): Promise<void> {
    if (!this.hasRoom() || this.stageNow().kind !== 'ready') return;
    await this.orNotKept(this.run.act(act));
  }

  goOn(): void {
    if (this.isPausedInLog()) this.note({kind: 'resume'});
    this.run.resume();
  }

  pause(): void {
    this.note({kind: 'pause'});
    this.run.halt('byPerson');
  }

  setFactor(factor: number): void {
    this.run.setFactor(factor);
    this.note({kind: 'factor', factor});
  }

  /** Hands in: the `end` entry is kept, then everything goes to the server. */
  async handIn(): Promise<void> {
    this.stageNow.set({kind: 'handingIn'});
    const end = await this.orNotKept(this.run.end());
    if (end !== null) await this.sendAgain();
    else if (this.stageNow().kind === 'handingIn') this.breakOff('stopped');
  }

  /** A person asked: send at once what waits. */
  async sendAgain(): Promise<void> {
    await this.held()?.sendWaiting();
  }

  /** Something was told about this attempt: perhaps another device has it now. */
  lookForWriter(): void {
    void this.beat?.now();
  }

  close(): void {
    this.isClosed = true;
    clearInterval(this.noteTimer);
    this.beat?.close();
    void this.noteTick();
    this.run.close();
    this.outbox.leave(this.attemptId);
  }

  private async takeUp(held: HeldAttempt): Promise<void> {
    this.held.set(held);
    const opened = await openAttempt(this.api, held.keeper);
    if (opened.kind === 'handedIn') await held.keeper.forget();
    if (opened.kind === 'ready') await this.goOnFrom(held, opened.kept, opened.log);
    else this.stageNow.set({kind: opened.kind});
  }

  private async goOnFrom(held: HeldAttempt, kept: KeptAttempt, log: TakenUp): Promise<void> {
    this.kept.set(kept);
    const {scenario, handOverS, limits} = kept.document;
    const document: Scenario = {...scenario, seed: kept.seed};
    const isStarted = await this.run.start({
      document,
      handOverS,
      limitS: limits.simulatedS,
      ...log,
    });
    if (!isStarted) {
      this.breakOff('stopped');
      return;
    }
    held.tick = () => this.run.view?.tick ?? 0;
    await held.sendWaiting();
    this.startBeats(held, kept.writerKey);
    // An `end` that was kept but not sent: the attempt only has to go out.
    const isEnded = log.entries.at(-1)?.kind === 'end';
    if (isEnded) this.run.halt('over');
    this.stageNow.set(
      isEnded
        ? {kind: 'handingIn'}
        : {kind: 'ready', isResumed: log.throughTick > 0 || log.entries.length > 0},
    );
    const factor = log.entries.findLast((entry) => entry.kind === 'factor');
    if (factor !== undefined) this.run.setFactor(factor.factor);
  }

  private startBeats(held: HeldAttempt, writerKey: string): void {
    this.beat?.close();
    this.beat = new Beat({
      post: (throughTick) => this.api.sendBeat(this.attemptId, writerKey, throughTick),
      tick: () => this.run.view?.tick ?? 0,
      isRunning: () => this.run.pauseReason() === null,
      writerChanged: (failure) => {
        this.run.halt('over');
        void held.stop(failure);
      },
    });
    void this.beat.now();
  }

  private async keep(entry: LogEntry): Promise<void> {
    const held = this.held();
    if (held === null) throw new Error('an attempt that is not held was acted on');
    await held.add(entry);
  }

  private note(note: Note): void {
    if (this.hasRoom()) void this.orNotKept(this.run.note(note));
  }

  private isPausedInLog(): boolean {
    const isPause = ({kind}: LogEntry): boolean => kind === 'pause' || kind === 'resume';
    return this.run.entries().findLast(isPause)?.kind === 'pause';
  }

  /** An entry that this device can't keep must not count as done: the run ends where the kept log ends. */
  private async orNotKept(keeping: Promise<LogEntry | null>): Promise<LogEntry | null> {
    try {
      return await keeping;
    } catch (error) {
      // DOMException: the disk is full, or the browser closed its database
      if (!(error instanceof DOMException)) throw error;
      this.breakOff('notKept');
      return null;
    }
  }

  private async orFail(work: () => Promise<void>): Promise<void> {
    try {
      await work();
    } catch (error) {
      this.stageNow.set({kind: 'failed', failure: toApiFailure(error)}); // offline, not found …
    }
  }

  private breakOff(why: 'notKept' | 'stopped'): void {
    this.run.halt('over');
    this.stageNow.set({kind: 'broken', why});
  }

  private async noteTick(): Promise<void> {
    const tick = this.run.view?.tick;
    if (tick === undefined || tick === this.notedTick || this.stageNow().kind !== 'ready') return;
    this.notedTick = tick;
    await this.held()?.keeper.noteTick(tick);
  }
}
