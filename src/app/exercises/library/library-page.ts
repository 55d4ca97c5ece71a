import {DecimalPipe} from '@angular/common';
import {ChangeDetectionStrategy, Component, inject, signal} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {RouterLink} from '@angular/router';
import {type ExerciseSummary} from '#shared/exercises/exercise';
import {type ApiFailure, toApiFailure} from '../../platform/api-failure';
import {type KeptAttempt} from '../../platform/person-database';
import {Session} from '../../session/session';
import {PageState} from '../../ui/page-state';
import {ExerciseApi} from '../exercise-api';
import {Outbox} from '../outbox/outbox';

/** All exercises of the organisation, with what one did so far. */
@Component({
  selector: 'app-library-page',
  templateUrl: './library-page.html',
  styleUrl: './library-page.scss',
  imports: [DecimalPipe, MatButtonModule, PageState, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LibraryPage {
  private readonly session = inject(Session);
  private readonly api = inject(ExerciseApi);
  private readonly outbox = inject(Outbox);

  protected readonly exercises = signal<readonly ExerciseSummary[] | null>(null);
  /** What can be gone on with while the server does not answer. */
  protected readonly keptHere = signal<readonly KeptAttempt[]>([]);
  protected readonly failure = signal<ApiFailure | null>(null);

  constructor() {
    void this.load();
  }

  protected async load(): Promise<void> {
    this.failure.set(null);
    try {
      this.exercises.set(await this.api.list());
    } catch (error) {
      this.failure.set(toApiFailure(error)); // told on the page, with another try
      if (this.session.may('attempts:run')) this.keptHere.set(await this.outbox.keptAttempts());
    }
  }
}
