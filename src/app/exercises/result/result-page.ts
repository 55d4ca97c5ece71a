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
import {Title} from '@angular/platform-browser';
import {Router, RouterLink} from '@angular/router';
import {type ApiFailure, toApiFailure} from '../../platform/api-failure';
import {EventFeed} from '../../platform/event-feed';
import {Session} from '../../session/session';
import {PageState} from '../../ui/page-state';
import {StartAttempt} from '../attempt/start-attempt';
import {ExerciseApi} from '../exercise-api';
import {AttemptLinks} from '../library/attempt-links';
import {linesOf, whyNotPassed} from './result-lines';
import {ResultStore} from './result-store';
import {ResultTrend} from './result-trend';
import {ScoreLine} from './score-line';

/** What came of an attempt: score by criterion with reasons, and the run with the true tension. */
@Component({
  selector: 'app-result-page',
  templateUrl: './result-page.html',
  styleUrl: './result-page.scss',
  imports: [
    AttemptLinks,
    DatePipe,
    DecimalPipe,
    MatButtonModule,
    PageState,
    ResultTrend,
    RouterLink,
    ScoreLine,
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ResultPage {
  protected readonly session = inject(Session);
  private readonly feed = inject(EventFeed);
  private readonly starter = inject(StartAttempt);
  private readonly router = inject(Router);
  private readonly title = inject(Title);

  readonly exerciseId = input.required<string>();
  readonly attemptId = input.required<string>();

  protected readonly store = new ResultStore(
    inject(ExerciseApi),
    () => this.session.me()?.id ?? null,
  );
  protected readonly startFailure = signal<ApiFailure | null>(null);
  protected readonly isStarting = signal(false);
  protected readonly isMine = computed(
    () => this.store.attempt()?.person.id === this.session.me()?.id,
  );
  protected readonly lines = computed(() => linesOf(this.store.attempt(), this.session.units()));
  protected readonly why = computed(() => whyNotPassed(this.store.attempt()));

  constructor() {
    effect((onCleanup) => {
      const id = this.attemptId();
      untracked(() => void this.store.open(id));
      const following = this.feed
        .follow([`attempt:${id}`])
        .subscribe((nudge) => nudge !== null && void this.store.load());
      onCleanup(() => following.unsubscribe());
    });
    effect(() => {
      const title = this.store.attempt()?.exercise.title;
      if (title !== undefined) this.title.setTitle(`${title}: result · Evenspan`);
    });
    inject(DestroyRef).onDestroy(() => this.store.close());
  }

  protected async tryAgain(): Promise<void> {
    this.isStarting.set(true);
    this.startFailure.set(null);
    try {
      const attemptId = await this.starter.start(this.exerciseId());
      await this.router.navigate(['/exercises', this.exerciseId(), 'attempts', attemptId]);
    } catch (error) {
      this.startFailure.set(toApiFailure(error)); // offline: nothing was begun
    } finally {
      this.isStarting.set(false);
    }
  }
}
