import {signal} from '@angular/core';
import {type Attempt, type AttemptSummary} from '#shared/attempts/attempt';
import {type ApiFailure, toApiFailure} from '../../platform/api-failure';
import {type ExerciseApi} from '../exercise-api';
import {type StoredLog} from './result-trend';

/** Nudges say when the score is there; this is for when they can't come [ms]. */
const LOOK_AGAIN_MS = 2000;

type Api = Pick<ExerciseApi, 'attempt' | 'log' | 'ownAttempts'>;

/** What came of one attempt, read until it is scored. */
export class ResultStore {
  private readonly attemptNow = signal<Attempt | null>(null);
  private readonly logNow = signal<StoredLog | null>(null);
  private readonly othersNow = signal<readonly AttemptSummary[]>([]);
  private readonly failed = signal<ApiFailure | null>(null);

  readonly attempt = this.attemptNow.asReadonly();
  /** Null until the attempt is handed in. */
  readonly log = this.logNow.asReadonly();
  /** The person's own other attempts at the exercise. */
  readonly others = this.othersNow.asReadonly();
  /** Why the newest read did not work; what was read before stays. */
  readonly failure = this.failed.asReadonly();

  private attemptId = '';
  private timer: ReturnType<typeof setTimeout> | undefined;

  constructor(
    private readonly api: Api,
    private readonly myId: () => string | null,
  ) {}

  async open(attemptId: string): Promise<void> {
    this.attemptId = attemptId;
    this.attemptNow.set(null);
    this.logNow.set(null);
    this.othersNow.set([]);
    await this.load();
  }

  /** Reads again: somebody asked, or a nudge came. */
  async load(): Promise<void> {
    clearTimeout(this.timer);
    const id = this.attemptId;
    try {
      const attempt = await this.api.attempt(id);
      if (id !== this.attemptId) return; // another attempt was opened meanwhile
      const isNews = attempt.state !== this.attemptNow()?.state;
      this.attemptNow.set(attempt);
      if (attempt.state !== 'running') await this.loadRest(attempt, isNews);
      this.failed.set(null);
    } catch (error) {
      if (id === this.attemptId) this.failed.set(toApiFailure(error)); // told, with another try
    }
    const isWaiting = this.attemptNow()?.state === 'handed-in';
    if (isWaiting && id === this.attemptId) {
      clearTimeout(this.timer);
      this.timer = setTimeout(() => void this.load(), LOOK_AGAIN_MS);
    }
  }

  close(): void {
    this.attemptId = '';
    clearTimeout(this.timer);
  }

  private async loadRest(attempt: Attempt, isNews: boolean): Promise<void> {
    if (isNews && attempt.person.id === this.myId()) {
      const all = await this.api.ownAttempts(attempt.exercise.id);
      if (attempt.id === this.attemptId)
        this.othersNow.set(all.filter(({id}) => id !== attempt.id));
    }
    if (this.logNow() !== null) return;
    const log = await this.api.log(attempt.id);
    if (attempt.id === this.attemptId) this.logNow.set(log);
  }
}
