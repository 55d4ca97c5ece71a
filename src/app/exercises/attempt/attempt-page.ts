import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  signal,
  untracked,
} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {Router, RouterLink} from '@angular/router';
import {type Score} from '#sim-core/index';
import {written} from '#shared/units';
import {eventWords} from '#shared/wording/run';
import {LinePanel} from '../../live-run/line-panel/line-panel';
import {type AllowedSettings, SettingsPanel} from '../../live-run/settings-panel/settings-panel';
import {TimePanel} from '../../live-run/time-panel/time-panel';
import {TrendChart} from '../../live-run/trend-chart/trend-chart';
import {WebPath} from '../../live-run/web-path/web-path';
import {Session} from '../../session/session';
import {PageState} from '../../ui/page-state';
import {Brief} from '../library/brief';
import {CriteriaList} from '../library/criteria-list';
import {AttemptStore} from './attempt-store';
import {interimScore} from './interim-score';

const INTERIM_MS = 1000;
const SAMPLE_S = 0.01;

/** An exercise while it is run: the Bench with a brief, locks and criteria; the true tension is hidden. */
@Component({
  selector: 'app-attempt-page',
  templateUrl: './attempt-page.html',
  styleUrl: './attempt-page.scss',
  imports: [
    Brief,
    CriteriaList,
    LinePanel,
    MatButtonModule,
    PageState,
    RouterLink,
    SettingsPanel,
    TimePanel,
    TrendChart,
    WebPath,
  ],
  providers: [AttemptStore],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: {'(document:visibilitychange)': 'pauseWhenHidden()'},
})
export class AttemptPage {
  protected readonly store = inject(AttemptStore);
  protected readonly session = inject(Session);
  private readonly router = inject(Router);

  readonly exerciseId = input.required<string>();
  readonly attemptId = input.required<string>();

  protected readonly run = this.store.run;
  protected readonly units = this.session.units;
  protected readonly isAsking = signal(false);
  protected readonly interim = signal<Score | null>(null);

  protected readonly stands = computed(() => this.run.readOuts()?.lineStands ?? true);
  protected readonly isOver = computed(
    () => this.run.outcome().kind !== 'running' || this.isTimeUp(),
  );
  protected readonly isTimeUp = computed(() => {
    const limitS = this.store.exercise()?.limits.simulatedS ?? Infinity;
    return (this.run.readOuts()?.tS ?? 0) >= limitS - SAMPLE_S / 2;
  });
  protected readonly leftText = computed(() => {
    const limitS = this.store.exercise()?.limits.simulatedS ?? 0;
    const left = Math.max(0, Math.ceil(limitS - (this.run.readOuts()?.tS ?? 0)));
    return `${Math.floor(left / 60)}:${String(left % 60).padStart(2, '0')}`;
  });
  protected readonly allowed = computed<AllowedSettings>(() =>
    Object.fromEntries(
      (this.store.exercise()?.touch.settings ?? []).map(({key, lowest, highest}) => [
        key,
        {lowest, highest},
      ]),
    ),
  );
  protected readonly band = computed(() => {
    const target = this.store.exercise()?.target;
    if (target === undefined) return null;
    return {
      lowest: target.tensionN - target.toleranceN,
      highest: target.tensionN + target.toleranceN,
    };
  });
  protected readonly topN = computed(() => 2 * (this.store.exercise()?.target.tensionN ?? 100));
  protected readonly shape = computed(() => {
    const scenario = this.store.exercise()?.scenario;
    return {
      coreRadiusM: scenario?.roll.coreRadiusM ?? 0.05,
      fullRadiusM: scenario?.roll.radiusM ?? 0.5,
      thicknessM: scenario?.web.thicknessM ?? 0.0001,
    };
  });
  protected readonly spoken = computed(() => {
    const last = this.run.events().at(-1);
    if (last === undefined) return '';
    return last.kind === 'phase'
      ? `Phase: ${last.phase ?? ''}`
      : (eventWords(last, this.units()) ?? '');
  });
  protected readonly ending = computed(() => {
    const outcome = this.run.outcome();
    if (outcome.kind === 'webBroke') {
      const reached = outcome.tensionN ?? NaN;
      return `The web broke at ${outcome.atS.toFixed(1)} s, at ${written('tension', reached, this.units())}. Hand in what you have.`;
    }
    if (outcome.kind !== 'running') return 'The run is over. Hand in what you have.';
    return this.isTimeUp() ? 'The time of this exercise is used up. Hand in what you have.' : '';
  });
  protected readonly sendingText = computed(() => {
    const state = this.store.sender();
    const unsent = this.store.unsent();
    if (state.kind === 'stopped') return '';
    return unsent === 0 ? 'Everything is saved.' : `${unsent} not sent yet, kept on this device.`;
  });
  protected readonly stopped = computed(() => {
    const state = this.store.sender();
    return state.kind === 'stopped' ? state.failure : null;
  });

  constructor() {
    effect(() => {
      const id = this.attemptId();
      untracked(() => void this.store.open(id));
    });
    effect(() => {
      if (this.store.stage().kind === 'handedIn') {
        void this.router.navigate(
          ['/exercises', this.exerciseId(), 'attempts', this.attemptId(), 'result'],
          {replaceUrl: true},
        );
      }
    });
    effect(() => {
      if (this.isTimeUp()) untracked(() => this.run.halt('over'));
    });
    effect((onCleanup) => {
      if (this.store.stage().kind !== 'ready') return;
      const timer = setInterval(() => this.scoreSoFar(), INTERIM_MS);
      onCleanup(() => clearInterval(timer));
    });
  }

  protected command(line: Parameters<LiveLine>[0]): void {
    this.store.goOn();
    void this.store.act({line});
  }

  protected pauseWhenHidden(): void {
    if (document.hidden && this.run.pauseReason() === null) this.run.halt('tabHidden');
    else if (!document.hidden && this.run.pauseReason() === 'tabHidden') this.run.resume();
  }

  private scoreSoFar(): void {
    const exercise = this.store.exercise();
    if (exercise === null || this.run.pauseReason() === 'notStarted') return;
    const endedEarly = this.run.outcome().kind !== 'running';
    this.interim.set(interimScore(exercise, this.run.trace, this.run.entries(), endedEarly));
  }
}

type LiveLine = (line: Parameters<LinePanel['commanded']['emit']>[0]) => void;
