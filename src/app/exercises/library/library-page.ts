import {DecimalPipe} from '@angular/common';
import {ChangeDetectionStrategy, Component, inject, signal} from '@angular/core';
import {RouterLink} from '@angular/router';
import {type ExerciseSummary} from '#shared/exercises/exercise';
import {type ApiFailure, toApiFailure} from '../../platform/api-failure';
import {PageState} from '../../ui/page-state';
import {ExerciseApi} from '../exercise-api';

/** All exercises of the organisation, with what one did so far. */
@Component({
  selector: 'app-library-page',
  templateUrl: './library-page.html',
  styleUrl: './library-page.scss',
  imports: [DecimalPipe, PageState, RouterLink],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LibraryPage {
  private readonly api = inject(ExerciseApi);

  protected readonly exercises = signal<readonly ExerciseSummary[] | null>(null);
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
    }
  }
}
