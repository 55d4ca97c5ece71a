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
import {MatButtonModule} from '@angular/material/button';
import {Title} from '@angular/platform-browser';
import {Router} from '@angular/router';
import {type LineCommand, type Score} from '#sim-core/index';
import {refusalSentence, spokenWords} from '#shared/wording/run';
import {LinePanel} from '../../live-run/line-panel/line-panel';
import {SAMPLE_S} from '../../live-run/sample-period';
import {SettingsPanel} from '../../live-run/settings-panel/settings-panel';
import {TimePanel} from '../../live-run/time-panel/time-panel';
import {TrendChart} from '../../live-run/trend-chart/trend-chart';
import {WebPath} from '../../live-run/web-path/web-path';
import {BuildCheck} from '../../platform/build-check';
import {EventFeed} from '../../platform/event-feed';
import {Session} from '../../session/session';
import {ExerciseApi} from '../exercise-api';
import {Brief} from '../library/brief';
import {CriteriaList} from '../library/criteria-list';
import {Outbox} from '../outbox/outbox';
import {AttemptStore} from './attempt-store';
import * as view from './attempt-view';
import {HandIn} from './hand-in';
import {interimScore} from './interim-score';
import {StageNotice} from './stage-notice';
import {StoppedNotice} from './stopped-notice';

const INTERIM_MS = 1000;

/** An exercise while it is run: the Bench with a brief, locks and criteria; the true tension is hidden. */
@Component({
  selector: 'app-attempt-page',
  templateUrl: './attempt-page.html',
  styleUrl: './attempt-page.scss',
  imports: [
    Brief,
    CriteriaList,
    HandIn,
    LinePanel,
    MatButtonModule,
    SettingsPanel,
    StageNotice,
    StoppedNotice,
    TimePanel,
    TrendChart,
    WebPath,
  ],
  providers: [
    {
      provide: AttemptStore,
      useFactory: () => new AttemptStore(inject(ExerciseApi), inject(Outbox)),
    },
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: {'(document:visibilitychange)': 'pauseWhenHidden()'},
})
export class AttemptPage {
  protected readonly store = inject(AttemptStore);
  private readonly session = inject(Session);
  private readonly router = inject(Router);
  private readonly feed = inject(EventFeed);
  private readonly title = inject(Title);

  readonly exerciseId = input.required<string>();
  readonly attemptId = input.required<string>();
  /** Speed of simulated time to begin with, of those the exercise allows. */
  readonly factor = input<string>();

  protected readonly run = this.store.run;
  protected readonly units = this.session.units;
  protected readonly isAsking = signal(false);
  protected readonly interim = signal<Score | null>(null);

  private readonly limitS = computed(() => this.store.exercise()?.limits.simulatedS ?? Infinity);
  private readonly runS = computed(() => this.run.readOuts()?.tS ?? 0);
  private readonly isTimeUp = computed(() => this.runS() >= this.limitS() - SAMPLE_S / 2);
  protected readonly stands = computed(() => this.run.readOuts()?.lineStands ?? true);
  protected readonly isOver = computed(
    () =>
      this.run.outcome().kind !== 'running' ||
      this.isTimeUp() ||
      !this.store.hasRoom() ||
      this.store.stopped()?.code === 'writer-changed',
  );
  protected readonly leftText = computed(() => view.timeLeft(this.limitS(), this.runS()));
  protected readonly allowed = computed(() => {
    const exercise = this.store.exercise();
    return exercise === null ? {} : view.allowedSettings(exercise);
  });
  protected readonly band = computed(() => {
    const exercise = this.store.exercise();
    return exercise === null ? null : view.bandOf(exercise);
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
  protected readonly spoken = computed(() => spokenWords(this.run.events().at(-1), this.units()));
  protected readonly refusals = computed(() => this.run.faults().map(refusalSentence));
  protected readonly ending = computed(() =>
    this.store.hasRoom()
      ? view.endingOf(this.run.outcome(), this.isTimeUp(), this.units())
      : 'This exercise allows no more changes. Let it run on, or hand in what you have.',
  );
  protected readonly waitsForContinue = computed(() => {
    const stage = this.store.stage();
    return stage.kind === 'ready' && stage.isResumed && this.run.pauseReason() === 'notStarted';
  });
  protected readonly sendingText = computed(() =>
    this.store.stopped() === null ? view.unsentWords(this.store.unsent()) : '',
  );

  constructor() {
    const letReload = inject(BuildCheck).holdDuringRun();
    inject(DestroyRef).onDestroy(() => {
      this.store.close();
      letReload();
    });
    effect(() => {
      const id = this.attemptId();
      untracked(() => void this.store.open(id));
    });
    effect(() => {
      const title = this.store.exercise()?.title;
      if (title !== undefined) this.title.setTitle(`${title} · Evenspan`);
    });
    effect(() => {
      if (this.store.stage().kind === 'handedIn') untracked(() => void this.showResult());
    });
    effect(() => {
      if (this.isTimeUp()) untracked(() => this.run.halt('over'));
    });
    effect((onCleanup) => {
      if (this.store.stage().kind !== 'ready') return;
      untracked(() => this.useFactor());
      onCleanup(this.followRun());
    });
  }

  protected handIn(): void {
    this.isAsking.set(false);
    void this.store.handIn();
  }

  protected command(line: LineCommand): void {
    this.store.goOn();
    void this.store.act({line});
  }

  protected pauseWhenHidden(): void {
    if (document.hidden && this.run.pauseReason() === null) this.run.halt('tabHidden');
    else if (!document.hidden && this.run.pauseReason() === 'tabHidden') this.run.resume();
  }

  private useFactor(): void {
    const factor = Number(this.factor());
    const isAllowed = this.store.exercise()?.time.factors.includes(factor) ?? false;
    if (isAllowed && this.run.factor() !== factor) this.store.setFactor(factor);
  }

  /** Marks as they stand, and nudges about who writes; returns how to stop both. */
  private followRun(): () => void {
    const timer = setInterval(() => this.scoreSoFar(), INTERIM_MS);
    const nudges = this.feed.follow([`attempt:${this.attemptId()}`]).subscribe((nudge) => {
      if (nudge?.kind === 'writer-changed') this.store.lookForWriter();
    });
    return () => {
      clearInterval(timer);
      nudges.unsubscribe();
    };
  }

  private scoreSoFar(): void {
    const exercise = this.store.exercise();
    if (exercise === null || this.run.pauseReason() === 'notStarted') return;
    const endedEarly = this.run.outcome().kind !== 'running';
    this.interim.set(interimScore(exercise, this.run.trace, this.run.entries(), endedEarly));
  }

  private async showResult(): Promise<void> {
    await this.router.navigate(
      ['/exercises', this.exerciseId(), 'attempts', this.attemptId(), 'result'],
      {replaceUrl: true},
    );
  }
}
