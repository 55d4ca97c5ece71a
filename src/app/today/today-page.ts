import {DatePipe, DecimalPipe} from '@angular/common';
import {ChangeDetectionStrategy, Component, computed, inject, signal} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {RouterLink} from '@angular/router';
import {type AttemptSummary, listAttempts, listOwnAttempts} from '#shared/attempts/attempt';
import {type ExerciseSummary, listExercises} from '#shared/exercises/exercise';
import {ApiCaller} from '../platform/api-caller';
import {type ApiFailure, toApiFailure} from '../platform/api-failure';
import {Session} from '../session/session';
import {Icon} from '../ui/icon';
import {PageState} from '../ui/page-state';

const SHOWN_ATTEMPTS = 5;

/** What is next for this person: the line, an open attempt, exercises, the last results. */
@Component({
  selector: 'app-today-page',
  templateUrl: './today-page.html',
  styleUrl: './today-page.scss',
  imports: [DatePipe, DecimalPipe, Icon, MatButtonModule, PageState, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TodayPage {
  protected readonly session = inject(Session);
  private readonly api = inject(ApiCaller);

  protected readonly failure = signal<ApiFailure | null>(null);
  protected readonly exercises = signal<readonly ExerciseSummary[] | null>(null);
  protected readonly attempts = signal<readonly AttemptSummary[] | null>(null);

  protected readonly readsOthers = computed(() => this.session.may('attempts:read-others'));
  protected readonly runsExercises = computed(() => this.session.may('attempts:run'));
  protected readonly isReady = computed(
    () => this.exercises() !== null && this.attempts() !== null,
  );
  protected readonly open = computed(() =>
    (this.exercises() ?? []).filter((exercise) => exercise.mine.openAttemptId !== null),
  );
  protected readonly next = computed(() =>
    (this.exercises() ?? []).filter(({mine}) => !mine.hasPassed && mine.openAttemptId === null),
  );

  constructor() {
    void this.load();
  }

  protected async load(): Promise<void> {
    this.failure.set(null);
    const list = this.readsOthers() ? listAttempts : listOwnAttempts;
    try {
      const [exercises, attempts] = await Promise.all([
        this.api.call(listExercises, {}),
        this.api.call(list, {query: {limit: SHOWN_ATTEMPTS}}),
      ]);
      this.exercises.set(exercises);
      this.attempts.set(attempts.items);
    } catch (error) {
      this.failure.set(toApiFailure(error)); // the page says so and offers another try
    }
  }
}
