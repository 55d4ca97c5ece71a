import {computed, inject, Injectable, signal} from '@angular/core';
import {
  type Act,
  type LineCommand,
  type LiveSettings,
  type LogEntry,
  type Scenario,
} from '#sim-core/index';
import {LiveRun} from '../live-run/live-run';
import {KeptHere, type KeptRun} from './kept-here';
import {SET_UPS, setUpOf} from './set-ups/library';
import {type RollSize, type SetUp, withRadius} from './set-ups/stand';

/** The free Bench: one run at a time, kept on this device until the next one; the one before can be had back. */
@Injectable()
export class BenchStore {
  private readonly kept = inject(KeptHere);
  readonly run: LiveRun = new LiveRun((entry) => this.keep([...this.run.entries(), entry]));

  private readonly size = signal<RollSize>('half');
  private readonly chosen = signal<SetUp>(SET_UPS[0]!);
  readonly setUp = this.chosen.asReadonly();
  readonly rollSize = this.size.asReadonly();
  /** What this run started with. */
  private readonly startedWith = signal<Scenario>(SET_UPS[0]!.scenario);
  private readonly before = signal<KeptRun | null>(null);
  private readonly isTakenUp = signal(false);
  /** Runs that tests ask for are not kept: they would push out a person's own. */
  private keepsRuns = true;

  readonly isReady = computed(() => this.run.document() !== null);
  readonly hasStarted = computed(() => this.gave('run'));
  readonly hasStopped = computed(() => this.gave('stop') || this.gave('fastStop'));
  readonly shownGroups = computed(() => [
    ...(this.hasStarted() ? ['Starting'] : []),
    ...(this.hasStopped() ? ['Stopping', 'Standstill'] : []),
  ]);
  /** Whether a run of an earlier visit stands here and nobody has said yet what to do with it. */
  readonly offersToGoOn = computed(
    () => this.isTakenUp() && this.run.pauseReason() === 'notStarted',
  );
  /** Whether the run before this one can be had back. */
  readonly canGoBack = computed(() => this.before() !== null && this.run.entries().length === 0);

  /** Begins where this device left off, or with the set-up. */
  async open(seed: number | null): Promise<void> {
    this.keepsRuns = seed === null;
    const kept = seed === null ? this.kept.read() : null;
    // A document that an older build kept and this one refuses starts anew.
    if (kept !== null && kept.entries.length > 0 && (await this.takeUp(kept))) return;
    const {scenario} = this.setUp();
    await this.begin(seed === null ? scenario : {...scenario, seed});
  }

  /** The next step of settings; time stands until the line is started. */
  async act(act: Act): Promise<void> {
    await this.run.act(act);
  }

  change(set: LiveSettings): Promise<void> {
    return this.act({set});
  }

  command(line: LineCommand): Promise<void> {
    this.run.resume();
    return this.act({line});
  }

  goOn(): void {
    this.run.resume();
    this.isTakenUp.set(false);
  }

  togglePause(): void {
    if (this.run.pauseReason() === null) this.run.halt('byPerson');
    else this.goOn();
  }

  /** The set-up as it was delivered; the run so far can be had back. */
  startAfresh(): Promise<void> {
    return this.begin(this.setUp().scenario, 'half');
  }

  /** The same roll and seed from the beginning, with the settings as they are now. */
  sameAgain(): Promise<void> {
    return this.begin(this.withSettingsNow());
  }

  /** Threads the web again after a break: same settings as now, the roll as it is. */
  threadAgain(): Promise<void> {
    const {coreRadiusM} = this.startedWith().roll;
    const leftM = this.run.view?.radiusM ?? 0;
    const isEmpty = leftM < coreRadiusM * 1.05;
    const radiusM = isEmpty ? this.setUp().radii[this.size()] : leftM;
    return this.begin(withRadius(this.withSettingsNow(), radiusM));
  }

  chooseRoll(size: RollSize): Promise<void> {
    return this.begin(withRadius(this.withSettingsNow(), this.setUp().radii[size]), size);
  }

  /** Another stand from the library, as it was delivered; the run so far can be had back. */
  async chooseSetUp(key: string): Promise<void> {
    const setUp = setUpOf(key);
    if (setUp === this.setUp()) return;
    await this.begin(setUp.scenario, 'half', setUp);
  }

  /** Takes the run before this one up again, where it was left. */
  async goBack(): Promise<void> {
    const before = this.before();
    if (before === null) return;
    this.before.set(null);
    await this.takeUp(before);
  }

  /** Notes how far the run is; called now and then, and when the page is left. */
  keepNow(): void {
    if (this.isReady()) void this.keep(this.run.entries());
  }

  private async begin(document: Scenario, size = this.size(), setUp = this.setUp()): Promise<void> {
    this.setAside();
    this.chosen.set(setUp);
    this.startedWith.set(document);
    this.size.set(size);
    this.isTakenUp.set(false);
    if (await this.run.start({document})) await this.keep([]);
  }

  /** Keeps the run so far to come back to, when anything was done in it. */
  private setAside(): void {
    const entries = this.run.entries();
    if (this.isReady() && entries.length > 0) this.before.set(this.runSoFar(entries));
  }

  private async takeUp(kept: KeptRun): Promise<boolean> {
    if (!(await this.run.start(kept))) return false;
    this.chosen.set(setUpOf(kept.setUp));
    this.startedWith.set(kept.document);
    this.size.set(kept.rollSize);
    this.isTakenUp.set(true);
    return true;
  }

  /** The document as it would start now: what was set while it ran stays. */
  private withSettingsNow(): Scenario {
    const document = this.startedWith();
    const settings = Object.fromEntries(
      Object.entries(this.run.settings()).filter(
        ([key, value]) => value !== null && (key in document.controller || isSet(this.run, key)),
      ),
    );
    return {...document, controller: {...document.controller, ...settings}};
  }

  private gave(command: LineCommand['command']): boolean {
    return this.run
      .entries()
      .some((entry) => entry.kind === 'line' && entry.line.command === command);
  }

  private runSoFar(entries: readonly LogEntry[]): KeptRun {
    return {
      document: this.startedWith(),
      entries,
      throughTick: this.run.view?.tick ?? 0,
      rollSize: this.size(),
      setUp: this.setUp().key,
    };
  }

  private keep(entries: readonly LogEntry[]): Promise<void> {
    if (this.keepsRuns) this.kept.write(this.runSoFar(entries));
    return Promise.resolve();
  }
}

/** Whether somebody set this key in the run. */
function isSet(run: LiveRun, key: string): boolean {
  return run.entries().some((entry) => entry.kind === 'set' && key in entry.set);
}
