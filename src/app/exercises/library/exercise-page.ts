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
import {Title} from '@angular/platform-browser';
import {Router, RouterLink} from '@angular/router';
import {type AttemptSummary} from '#shared/attempts/attempt';
import {type ExerciseSummary, type ExerciseToRun} from '#shared/exercises/exercise';
import {type ApiFailure, toApiFailure} from '../../platform/api-failure';
import {Session} from '../../session/session';
import {PageState} from '../../ui/page-state';
import {StartAttempt} from '../attempt/start-attempt';
import {ExerciseApi} from '../exercise-api';
import {AttemptLinks} from './attempt-links';
import {Brief} from './brief';
import {CriteriaList} from './criteria-list';

/** One exercise before it is run: brief, criteria, cautions, own attempts, and the start. */
@Component({
  selector: 'app-exercise-page',
  templateUrl: './exercise-page.html',
  styleUrl: './exercise-page.scss',
  imports: [AttemptLinks, Brief, CriteriaList, MatButtonModule, PageState, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ExercisePage {
  protected readonly session = inject(Session);
  private readonly api = inject(ExerciseApi);
  private readonly starter = inject(StartAttempt);
  private readonly router = inject(Router);
  private readonly title = inject(Title);

  readonly exerciseId = input.required<string>();

  protected readonly summary = signal<ExerciseSummary | null>(null);
  protected readonly exercise = signal<ExerciseToRun | null>(null);
  protected readonly attempts = signal<readonly AttemptSummary[]>([]);
  protected readonly failure = signal<ApiFailure | null>(null);
  protected readonly startFailure = signal<ApiFailure | null>(null);
  protected readonly isStarting = signal(false);
  protected readonly mayRun = computed(() => this.session.may('attempts:run'));

  protected readonly passWords = computed(() => {
    const exercise = this.exercise();
    if (exercise === null) return '';
    const {passMark, limits} = exercise;
    const minutes = Math.round(limits.simulatedS / 6) / 10;
    const tries = limits.tries === null ? '' : ` ${limits.tries} attempts are allowed.`;
    return `${passMark} of 100 marks pass, with no line at zero. At most ${minutes} minutes are simulated.${tries}`;
  });

  constructor() {
    effect(() => {
      this.exerciseId();
      untracked(() => void this.load());
    });
  }

  protected async load(): Promise<void> {
    this.failure.set(null);
    try {
      const [{summary, exercise}, attempts] = await Promise.all([
        this.api.read(this.exerciseId()),
        this.mayRun() ? this.api.ownAttempts(this.exerciseId()) : [],
      ]);
      this.summary.set(summary);
      this.exercise.set(exercise);
      this.title.setTitle(`${exercise.title} · Evenspan`);
      this.attempts.set(attempts);
    } catch (error) {
      this.failure.set(toApiFailure(error)); // told on the page, with another try
    }
  }

  protected async start(): Promise<void> {
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
