import {
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  inject,
  input,
  numberAttribute,
  type OnInit,
  signal,
  viewChild,
} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {MatSlideToggleModule} from '@angular/material/slide-toggle';
import {refusalSentence, spokenWords} from '#shared/wording/run';
import {written} from '#shared/units';
import {Figures} from '../live-run/figures/figures';
import {LinePanel} from '../live-run/line-panel/line-panel';
import {SettingsPanel} from '../live-run/settings-panel/settings-panel';
import {TimePanel} from '../live-run/time-panel/time-panel';
import {TrendChart} from '../live-run/trend-chart/trend-chart';
import {WebPath} from '../live-run/web-path/web-path';
import {BuildCheck} from '../platform/build-check';
import {Session} from '../session/session';
import {type BenchKey, BenchKeys} from './bench-keys';
import {BenchStore} from './bench-store';
import {FirstSteps} from './first-steps';
import {OFFERED} from './set-ups/library';
import {type RollSize} from './set-ups/stand';

const KEEP_EVERY_MS = 2000;
const SIZES: readonly {readonly key: RollSize; readonly name: string}[] = [
  {key: 'small', name: 'Small roll'},
  {key: 'half', name: 'Half roll'},
  {key: 'full', name: 'Full roll'},
];

/** The sandbox: the stand, its trends, its settings, and a line to run. */
@Component({
  selector: 'app-bench-page',
  templateUrl: './bench-page.html',
  styleUrl: './bench-page.scss',
  imports: [
    BenchKeys,
    Figures,
    FirstSteps,
    LinePanel,
    MatButtonModule,
    MatSlideToggleModule,
    SettingsPanel,
    TimePanel,
    TrendChart,
    WebPath,
  ],
  providers: [BenchStore],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: {
    '(document:visibilitychange)': 'pauseWhenHidden()',
    '(window:pagehide)': 'store.keepNow()',
  },
})
export class BenchPage implements OnInit {
  protected readonly store = inject(BenchStore);
  protected readonly session = inject(Session);

  /** Seed and ticks of a run that tests ask for (query parameters). */
  readonly seed = input<number | null, string | undefined>(null, {transform: numberOrNull});
  readonly ticks = input<number | null, string | undefined>(null, {transform: numberOrNull});

  protected readonly run = this.store.run;
  protected readonly units = this.session.units;
  protected readonly showsTruth = signal(false);
  private readonly linePanel = viewChild(LinePanel);
  protected readonly sizes = SIZES;
  protected readonly setUps = OFFERED;
  /** What the fields of the line begin with on this stand. */
  protected readonly firstOnLine = computed(() => {
    const {speedMps, rampS, stopS, firstStopS = stopS} = this.store.setUp().job;
    return {speedMps, startS: rampS, stopS: firstStopS, fastStopS: 0.6 * firstStopS};
  });
  protected readonly setPointN = computed(
    () => (this.run.settings()['setPointN'] ?? 200) as number,
  );
  protected readonly band = computed(() => ({
    lowest: 0.9 * this.setPointN(),
    highest: 1.1 * this.setPointN(),
  }));
  protected readonly yardstick = computed(() => ({
    targetN: this.setPointN(),
    toleranceN: 0.1 * this.setPointN(),
    lowestPct: (this.run.settings()['outMinPct'] ?? 0) as number,
    highestPct: (this.run.settings()['outMaxPct'] ?? 100) as number,
  }));
  protected readonly shape = computed(() => {
    const {scenario, radii} = this.store.setUp();
    return {
      coreRadiusM: scenario.roll.coreRadiusM,
      fullRadiusM: radii.full,
      thicknessM: scenario.web.thicknessM,
    };
  });
  protected readonly stands = computed(() => this.run.readOuts()?.lineStands ?? true);
  protected readonly isOver = computed(() => this.run.outcome().kind !== 'running');
  protected readonly ending = computed(() => this.describeEnding());
  /** Why the last act was not done. */
  protected readonly refusals = computed(() => this.run.faults().map(refusalSentence));
  protected readonly couldNotStart = computed(
    () => this.run.faults().length > 0 || this.run.failure() !== null,
  );
  protected readonly keptText = computed(() => {
    const acts = this.run.entries().length;
    const seconds = Math.round(this.run.readOuts()?.tS ?? 0);
    return `Your last run is here: ${seconds} s, ${acts} ${acts === 1 ? 'act' : 'acts'}.`;
  });
  /** What screen readers hear: events, not numbers. */
  protected readonly spoken = computed(() => spokenWords(this.run.events().at(-1), this.units()));

  constructor() {
    const letReload = inject(BuildCheck).holdDuringRun();
    const timer = setInterval(() => this.store.keepNow(), KEEP_EVERY_MS);
    inject(DestroyRef).onDestroy(() => {
      clearInterval(timer);
      letReload();
      this.store.keepNow();
      this.run.close();
    });
  }

  ngOnInit(): void {
    void this.open();
  }

  /** A hidden tab gets no frames: time stands, and stays so until somebody goes on. */
  protected pauseWhenHidden(): void {
    if (document.hidden && this.run.pauseReason() === null) this.run.halt('tabHidden');
  }

  protected obey(key: BenchKey): void {
    const isOver = this.isOver();
    if (key === 'start' && !isOver) this.linePanel()?.giveRun();
    else if (key === 'stop' && !isOver && !this.stands()) this.linePanel()?.giveStop();
    else if (key === 'pause') this.store.togglePause();
    else if (key === 'step' && this.run.pauseReason() !== null) void this.run.advance(1);
    else if (key === 'thread' && isOver) void this.store.threadAgain();
    else if (key === 'again') void this.store.sameAgain();
  }

  private async open(): Promise<void> {
    await this.store.open(this.seed());
    const ticks = this.ticks();
    if (ticks !== null) {
      await this.run.act({line: {command: 'run', speedMps: 2, rampS: 10}});
      await this.run.advance(ticks);
    }
  }

  private describeEnding(): string {
    const outcome = this.run.outcome();
    switch (outcome.kind) {
      case 'webBroke': {
        const {breakNPerM, widthM} = this.store.setUp().scenario.web;
        const reached = written('tension', outcome.tensionN ?? breakNPerM * widthM, this.units());
        const limit = written('tension', breakNPerM * widthM, this.units());
        return `The web broke at ${outcome.atS.toFixed(1)} s: ${reached}, limit ${limit}.`;
      }
      case 'rollEmpty':
        return `The roll was empty at ${outcome.atS.toFixed(1)} s.`;
      case 'diverged':
        return 'The model left its limits. The settings are kept.';
      case 'running':
        return '';
    }
  }
}

function numberOrNull(text: string | undefined): number | null {
  const number = numberAttribute(text, NaN);
  return Number.isFinite(number) ? number : null;
}
