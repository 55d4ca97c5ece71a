import {DatePipe, DecimalPipe} from '@angular/common';
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
import {Router, RouterLink} from '@angular/router';
import {type Attempt, type AttemptSummary} from '#shared/attempts/attempt';
import {LiveRun} from '../../live-run/live-run';
import {TrendChart} from '../../live-run/trend-chart/trend-chart';
import {type ApiFailure, toApiFailure} from '../../platform/api-failure';
import {EventFeed} from '../../platform/event-feed';
import {Session} from '../../session/session';
import {PageState} from '../../ui/page-state';
import {StartAttempt} from '../attempt/start-attempt';
import {ExerciseApi} from '../exercise-api';
import {linesOf, numbersOf} from './result-lines';
import {ScoreLine} from './score-line';

/** Nudges say when the score is there; this is for when they can't come [ms]. */
const LOOK_AGAIN_MS = 2000;

/** What came of an attempt: score by criterion with reasons, and the run with the true tension. */
@Component({
  selector: 'app-result-page',
  templateUrl: './result-page.html',
  styleUrl: './result-page.scss',
  imports: [DatePipe, DecimalPipe, MatButtonModule, PageState, RouterLink, ScoreLine, TrendChart],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ResultPage {
  protected readonly session = inject(Session);
  private readonly api = inject(ExerciseApi);
  private readonly feed = inject(EventFeed);
  private readonly starter = inject(StartAttempt);
  private readonly router = inject(Router);

  readonly exerciseId = input.required<string>();
  readonly attemptId = input.required<string>();

  protected readonly attempt = signal<Attempt | null>(null);
  protected readonly others = signal<readonly AttemptSummary[]>([]);
  protected readonly failure = signal<ApiFailure | null>(null);
  protected readonly hasTrend = signal(false);
  protected readonly run = new LiveRun();

  protected readonly isMine = computed(() => this.attempt()?.person.id === this.session.me()?.id);
  protected readonly lines = computed(() => linesOf(this.attempt(), this.session.units()));
  protected readonly numbers = computed(() => numbersOf(this.attempt()));
  protected readonly exercise = computed(() => this.attempt()?.exerciseDocument ?? null);
  protected readonly band = computed(() => {
    const target = this.exercise()?.target;
    if (target === undefined) return null;
    const {tensionN, toleranceN} = target;
    return {lowest: tensionN - toleranceN, highest: tensionN + toleranceN};
  });
  protected readonly verdict = computed(() => {
    const attempt = this.attempt();
    if (attempt?.result == null) return '';
    if (attempt.result.passed) return 'passed';
    return 'not yet';
  });
  protected readonly why = computed(() => this.explain());

  private timer: ReturnType<typeof setTimeout> | undefined;

  constructor() {
    effect((onCleanup) => {
      const id = this.attemptId();
      untracked(() => void this.load());
      const following = this.feed.follow([`attempt:${id}`]).subscribe(() => void this.load());
      onCleanup(() => {
        following.unsubscribe();
        clearTimeout(this.timer);
      });
    });
    inject(DestroyRef).onDestroy(() => this.run.close());
  }

  protected async load(): Promise<void> {
    clearTimeout(this.timer);
    try {
      const attempt = await this.api.attempt(this.attemptId());
      this.failure.set(null);
      const isNews = attempt.state !== this.attempt()?.state;
      if (isNews) this.attempt.set(attempt);
      if (attempt.state === 'handed-in') {
        this.timer = setTimeout(() => void this.load(), LOOK_AGAIN_MS);
      }
      if (isNews && attempt.state !== 'running') await this.loadRest(attempt);
    } catch (error) {
      if (this.attempt() === null) this.failure.set(toApiFailure(error)); // told, with another try
    }
  }

  protected async tryAgain(): Promise<void> {
    try {
      const attemptId = await this.starter.start(this.exerciseId());
      await this.router.navigate(['/exercises', this.exerciseId(), 'attempts', attemptId]);
    } catch (error) {
      this.failure.set(toApiFailure(error)); // offline: nothing was begun
    }
  }

  private async loadRest(attempt: Attempt): Promise<void> {
    if (this.isMine()) {
      const all = await this.api.ownAttempts(this.exerciseId());
      this.others.set(all.filter(({id}) => id !== attempt.id));
    }
    if (this.hasTrend()) return;
    const {entries, throughTick} = await this.api.log(attempt.id);
    const {scenario, handOverS} = attempt.exerciseDocument;
    const document = {...scenario, seed: attempt.seed};
    this.hasTrend.set(await this.run.start({document, handOverS, entries, throughTick}));
  }

  private explain(): string {
    const result = this.attempt()?.result;
    const passMark = this.exercise()?.passMark ?? 0;
    if (result == null || result.passed) return '';
    if (result.criteria.some(({reason}) => reason === 'overLimit')) {
      return 'A limit that must never be passed was passed.';
    }
    if (result.score >= passMark) return `${passMark} passes, but one line is at zero.`;
    return `${passMark} passes, with no line at zero.`;
  }
}
