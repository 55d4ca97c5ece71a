import {
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  effect,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import {type LogEntry} from '#sim-core/index';
import {type Attempt} from '#shared/attempts/attempt';
import {type UnitSystem} from '#shared/units';
import {LiveRun} from '../../live-run/live-run';
import {TrendChart} from '../../live-run/trend-chart/trend-chart';
import {bandOf} from '../attempt/attempt-view';
import {numbersOf} from './result-lines';

/** The stored log of an attempt. */
export interface StoredLog {
  readonly entries: readonly LogEntry[];
  readonly throughTick: number;
}

/** The run of an attempt, simulated again from its stored log, with the true web tension. */
@Component({
  selector: 'app-result-trend',
  template: `
    <h2>The run, with the true web tension</h2>
    @if (isDrawn()) {
      <app-trend-chart
        [run]="run"
        [units]="units()"
        [showsTruth]="true"
        [band]="band()"
        [topN]="2 * document().target.tensionN"
        [largestRadiusM]="document().scenario.roll.radiusM"
        [numbers]="numbers()"
        [firstWindowS]="'all'"
      />
    } @else if (hasFailed()) {
      <p role="alert">
        The run could not be simulated again here. The score is not touched by that.
      </p>
    } @else {
      <p class="muted" role="status">Simulating the run again …</p>
    }
  `,
  imports: [TrendChart],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ResultTrend {
  readonly attempt = input.required<Attempt>();
  readonly log = input.required<StoredLog>();
  readonly units = input<UnitSystem>('si');

  protected readonly run = new LiveRun();
  protected readonly isDrawn = signal(false);
  protected readonly hasFailed = signal(false);
  protected readonly document = computed(() => this.attempt().exerciseDocument);
  protected readonly band = computed(() => bandOf(this.document()));
  protected readonly numbers = computed(() => numbersOf(this.attempt()));

  constructor() {
    effect(() => {
      const log = this.log();
      untracked(() => void this.simulate(log));
    });
    inject(DestroyRef).onDestroy(() => this.run.close());
  }

  private async simulate({entries, throughTick}: StoredLog): Promise<void> {
    const {exerciseDocument, seed} = this.attempt();
    const {scenario, handOverS} = exerciseDocument;
    const document = {...scenario, seed};
    const isStarted = await this.run.start({document, handOverS, entries, throughTick});
    this.isDrawn.set(isStarted);
    this.hasFailed.set(!isStarted);
  }
}
