import {computed, inject, Injectable, signal} from '@angular/core';
import {type Act, type LineCommand, type LiveSettings, type Scenario} from '#sim-core/index';
import {LiveRun} from '../live-run/live-run';
import {KeptHere} from './kept-here';
import {COATER_1, type SetUp, withRadius} from './set-ups';

export type RollSize = keyof SetUp['radii'];

/** The free Bench: one run at a time, kept on this device until the next one. */
@Injectable()
export class BenchStore {
  private readonly kept = inject(KeptHere);
  readonly run = new LiveRun(() => this.keep());

  private readonly size = signal<RollSize>('full');
  readonly setUp = signal(COATER_1).asReadonly();
  readonly rollSize = this.size.asReadonly();
  /** What the next run starts with: the settings that were found stay. */
  private readonly startedWith = signal<Scenario>(COATER_1.scenario);

  readonly isReady = computed(() => this.run.document() !== null);
  readonly hasStarted = computed(() => this.gave('run'));
  readonly hasStopped = computed(() => this.gave('stop') || this.gave('fastStop'));
  readonly shownGroups = computed(() => [
    ...(this.hasStarted() ? ['Starting'] : []),
    ...(this.hasStopped() ? ['Stopping', 'Standstill'] : []),
  ]);

  /** Begins where this device left off, or with the set-up. */
  async open(seed: number | null): Promise<void> {
    const kept = seed === null ? this.kept.read() : null;
    if (kept !== null) {
      this.startedWith.set(kept.document);
      this.size.set(kept.rollSize);
      // A document that an older build kept and this one refuses starts anew.
      if (await this.run.start(kept)) return;
    }
    const {scenario} = this.setUp();
    await this.begin(seed === null ? scenario : {...scenario, seed});
  }

  async act(act: Act): Promise<void> {
    await this.run.act(act);
    if (this.run.pauseReason() === 'notStarted') this.run.resume();
  }

  change(set: LiveSettings): Promise<void> {
    return this.act({set});
  }

  command(line: LineCommand): Promise<void> {
    this.run.resume();
    return this.act({line});
  }

  togglePause(): void {
    if (this.run.pauseReason() === null) this.run.halt('byPerson');
    else this.run.resume();
  }

  /** The same stand, settings and seed again, from the beginning. */
  sameAgain(): Promise<void> {
    return this.begin(this.startedWith());
  }

  /** Threads the web again after a break: same settings as now, the roll as it is. */
  threadAgain(): Promise<void> {
    const view = this.run.view;
    const radiusM = Math.max(view?.radiusM ?? 0, this.startedWith().roll.coreRadiusM * 1.05);
    return this.begin(withRadius(this.withSettingsNow(), radiusM));
  }

  chooseRoll(size: RollSize): Promise<void> {
    this.size.set(size);
    return this.begin(withRadius(this.withSettingsNow(), this.setUp().radii[size]));
  }

  private async begin(document: Scenario): Promise<void> {
    this.startedWith.set(document);
    if (await this.run.start({document})) await this.keep();
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

  private keep(): Promise<void> {
    this.kept.write({
      document: this.startedWith(),
      entries: this.run.entries(),
      throughTick: this.run.view?.tick ?? 0,
      rollSize: this.size(),
    });
    return Promise.resolve();
  }

  /** Notes how far the run is; called now and then, and when the page is left. */
  keepNow(): void {
    void this.keep();
  }
}

/** Whether somebody set this key in the run. */
function isSet(run: LiveRun, key: string): boolean {
  return run.entries().some((entry) => entry.kind === 'set' && key in entry.set);
}
