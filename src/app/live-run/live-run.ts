import {signal} from '@angular/core';
import {
  type Act,
  type Fault,
  type LiveSettings,
  type LogEntry,
  type Note,
  type Outcome,
  type Phase,
  type RunEvent,
  type RunHash,
  type RunView,
  type Scenario,
} from '#sim-core/index';
import {BROWSER_FRAMES, FrameLoop, type FrameSource} from './frame-loop';
import {openPlant, type PlantLink} from './plant/plant-link';
import {type FromPlant, type Standing, type ToPlant} from './plant/run-messages';
import {SAMPLE_S} from './sample-period';
import {TraceStore} from './trace/trace-store';

/** Read-outs follow at this pace [ms]: people read five numbers a second at most. */
const READ_OUT_MS = 200;

/** Keeps an entry safe before the screen shows it as done. */
export type Recorder = (entry: LogEntry) => Promise<void>;

/** Why time stands still. */
export type PauseReason = 'notStarted' | 'byPerson' | 'tabHidden' | 'over';

export interface LiveRunStart {
  readonly document: Scenario;
  readonly handOverS?: number;
  readonly entries?: readonly LogEntry[];
  readonly throughTick?: number;
  /** The run goes no further than this [s], however much is asked for. */
  readonly limitS?: number;
}

/** One run as the page knows it: asks the plant, keeps the trace, publishes what people see. */
export class LiveRun {
  private readonly state = {
    phase: signal<Phase>('standstill'),
    readOuts: signal<RunView | null>(null),
    settings: signal<Readonly<Record<string, unknown>>>({}),
    events: signal<readonly RunEvent[]>([]),
    entries: signal<readonly LogEntry[]>([]),
    outcome: signal<Outcome>({kind: 'running'}),
    faults: signal<readonly Fault[]>([]),
    pause: signal<PauseReason | null>('notStarted'),
    factor: signal(1),
    document: signal<Scenario | null>(null),
    failure: signal<string | null>(null),
  };
  readonly trace = new TraceStore();

  readonly phase = this.state.phase.asReadonly();
  /** The view five times a second, for numbers that people read. */
  readonly readOuts = this.state.readOuts.asReadonly();
  /** Settings in force, by key. */
  readonly settings = this.state.settings.asReadonly();
  readonly events = this.state.events.asReadonly();
  /** The log: what is safely recorded. */
  readonly entries = this.state.entries.asReadonly();
  readonly outcome = this.state.outcome.asReadonly();
  /** Why the last act or document was refused. */
  readonly faults = this.state.faults.asReadonly();
  readonly pauseReason = this.state.pause.asReadonly();
  readonly factor = this.state.factor.asReadonly();
  readonly document = this.state.document.asReadonly();
  /** A bug that ended the plant, as a sentence. */
  readonly failure = this.state.failure.asReadonly();

  private newest: Standing | null = null;
  private plant: PlantLink | null = null;
  private readonly loop: FrameLoop;
  private readonly frameCallbacks = new Set<(view: RunView) => void>();
  private lastReadOutMs = -Infinity;
  private limitTick = Infinity;
  private acting: Promise<unknown> = Promise.resolve();

  constructor(
    private readonly record: Recorder = () => Promise.resolve(),
    private readonly open: () => PlantLink = openPlant,
    private readonly frames: FrameSource = BROWSER_FRAMES,
  ) {
    this.loop = new FrameLoop(
      {sampleS: SAMPLE_S, advance: (ticks) => this.advance(ticks)},
      () => this.drawFrame(),
      frames,
    );
  }

  /** The view of this moment, for pictures; null before the start. */
  get view(): RunView | null {
    return this.newest?.view ?? null;
  }

  /** Starts a document, or takes a log up; stays paused until `resume`. */
  async start(start: LiveRunStart): Promise<boolean> {
    this.close();
    this.plant = this.open();
    this.trace.clear();
    this.state.events.set([]);
    this.state.faults.set([]);
    this.state.failure.set(null);
    this.state.outcome.set({kind: 'running'});
    const {document, handOverS = 0, entries = [], throughTick = 0, limitS = Infinity} = start;
    this.limitTick = Math.round(limitS / SAMPLE_S);
    const answer = await this.ask({
      kind: 'start',
      start: {document, entries, throughTick, handOverTick: Math.round(handOverS / SAMPLE_S)},
    });
    if (answer?.kind !== 'started') return false;
    this.state.document.set(document);
    this.state.entries.set(entries);
    this.trace.append(answer.trace);
    this.stand(answer.standing);
    this.publishReadOuts();
    this.drawFrame();
    return true;
  }

  /** Acts on the plant in its next tick. Resolves to the entry when it is recorded, to null when refused. */
  act(act: Act): Promise<LogEntry | null> {
    return this.inOrder(() => this.enter({kind: 'act', act}));
  }

  /** Writes a note for scoring into the log. */
  note(note: Note): Promise<LogEntry | null> {
    return this.inOrder(() => this.enter({kind: 'note', note}));
  }

  /** Stops time and closes the log with an `end` entry that carries the run's hash. */
  end(): Promise<LogEntry | null> {
    this.halt('over');
    return this.inOrder(() => this.enter({kind: 'end'}));
  }

  resume(): void {
    if (this.state.outcome().kind !== 'running' || this.state.pause() === 'over') return;
    this.state.pause.set(null);
    this.loop.start();
  }

  halt(reason: PauseReason): void {
    this.loop.stop();
    this.state.pause.set(reason);
    this.publishReadOuts();
  }

  setFactor(factor: number): void {
    this.loop.factor = factor;
    this.state.factor.set(factor);
  }

  /** Runs ticks at once, paused or not: single steps, and tests that ask instead of waiting. */
  async advance(ticks: number): Promise<void> {
    const allowed = Math.min(ticks, this.limitTick - (this.view?.tick ?? 0));
    if (allowed <= 0) return;
    const answer = await this.ask({kind: 'advance', ticks: allowed});
    if (answer?.kind !== 'rows') return;
    this.trace.append(answer.trace);
    this.stand(answer.standing);
    if (!this.loop.isRunning) {
      this.publishReadOuts();
      this.drawFrame();
    }
  }

  /** Fingerprint of the run so far; null when there is none. */
  async hash(): Promise<RunHash | null> {
    const answer = await this.ask({kind: 'hash'});
    return answer?.kind === 'hashed' ? answer.hash : null;
  }

  /** Calls back at each frame with the newest view; returns how to stop it. */
  onFrame(callback: (view: RunView) => void): () => void {
    this.frameCallbacks.add(callback);
    if (this.view !== null) callback(this.view);
    return () => this.frameCallbacks.delete(callback);
  }

  close(): void {
    this.loop.stop();
    this.plant?.close();
    this.plant = null;
    this.state.pause.set('notStarted');
  }

  private async enter(message: ToPlant): Promise<LogEntry | null> {
    this.state.faults.set([]);
    const answer = await this.ask(message);
    if (answer?.kind !== 'acted') return null;
    await this.record(answer.entry); // first safe, then shown
    this.state.entries.update((entries) => [...entries, answer.entry]);
    this.stand(answer.standing);
    this.publishReadOuts();
    return answer.entry;
  }

  /** One act after the other: entries must be recorded in the order of their numbers. */
  private inOrder<T>(work: () => Promise<T>): Promise<T> {
    const done = this.acting.then(work, work);
    this.acting = done.catch(() => undefined); // told to whoever asked
    return done;
  }

  private async ask(message: ToPlant): Promise<FromPlant | null> {
    const plant = this.plant;
    if (plant === null) return null;
    let answer: FromPlant;
    try {
      answer = await plant.ask(message);
    } catch (error) {
      // The worker died (a bug of ours): the log is kept, the run can be taken up again.
      this.state.failure.set(error instanceof Error ? error.message : String(error));
      this.halt('over');
      return null;
    }
    if (plant !== this.plant) return null; // an answer of a run that was left
    if (answer.kind === 'refused') this.state.faults.set(answer.faults);
    return answer;
  }

  private stand(standing: Standing): void {
    const {view, outcome, events} = standing;
    this.newest = standing;
    if (view.phase !== this.state.phase()) this.state.phase.set(view.phase);
    if (events.length > 0) this.state.events.update((old) => [...old, ...events]);
    if (outcome.kind !== this.state.outcome().kind) {
      this.state.outcome.set(outcome);
      if (outcome.kind !== 'running') this.halt('over');
    }
  }

  private drawFrame(): void {
    const view = this.view;
    if (view === null) return;
    for (const callback of this.frameCallbacks) callback(view);
    if (this.frames.now() - this.lastReadOutMs >= READ_OUT_MS) this.publishReadOuts();
  }

  /** What was set and takes effect in the next tick: while time stands it is in force for people already. */
  private pendingSettings(tick: number): LiveSettings {
    let pending: LiveSettings = {};
    const entries = this.state.entries();
    for (let place = entries.length - 1; place >= 0; place--) {
      const entry = entries[place]!;
      if (entry.tick < tick) break;
      if (entry.kind === 'set') pending = {...entry.set, ...pending};
    }
    return pending;
  }

  private publishReadOuts(): void {
    this.lastReadOutMs = this.frames.now();
    if (this.newest === null) return;
    const {view} = this.newest;
    this.state.readOuts.set(view);
    const settings = {...this.newest.settings, ...this.pendingSettings(view.tick)};
    if (!isSame(settings, this.state.settings())) this.state.settings.set(settings);
  }
}

function isSame(
  one: Readonly<Record<string, unknown>>,
  other: Readonly<Record<string, unknown>>,
): boolean {
  const keys = Object.keys(one);
  return (
    keys.length === Object.keys(other).length && keys.every((key) => isEqual(one[key], other[key]))
  );
}

/** A list (gain by diameter) comes as a new copy each time. */
function isEqual(one: unknown, other: unknown): boolean {
  return one === other || (Array.isArray(one) && JSON.stringify(one) === JSON.stringify(other));
}
