import {DatePipe, DecimalPipe} from '@angular/common';
import {ChangeDetectionStrategy, Component, DestroyRef, inject, signal} from '@angular/core';
import {takeUntilDestroyed} from '@angular/core/rxjs-interop';
import {MatButtonModule} from '@angular/material/button';
import {MatFormFieldModule} from '@angular/material/form-field';
import {MatInputModule} from '@angular/material/input';
import {RouterLink} from '@angular/router';
import {debounceTime, merge, Subject} from 'rxjs';
import {type AttemptSummary, downloadAttempts, listAttempts} from '#shared/attempts/attempt';
import {ApiCaller, urlOf} from '../platform/api-caller';
import {type ApiFailure, toApiFailure} from '../platform/api-failure';
import {EventFeed} from '../platform/event-feed';
import {PageState} from '../ui/page-state';

const PAGE = 50;
/** Typing and nudges gather this long before the list is read again [ms]. */
const GATHER_MS = 300;

/** Everybody's attempts in the organisation, newest first, as they come in. */
@Component({
  selector: 'app-attempts-page',
  templateUrl: './attempts-page.html',
  styleUrl: './attempts-page.scss',
  imports: [
    DatePipe,
    DecimalPipe,
    MatButtonModule,
    MatFormFieldModule,
    MatInputModule,
    PageState,
    RouterLink,
  ],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AttemptsPage {
  private readonly api = inject(ApiCaller);

  protected readonly csvUrl = urlOf(downloadAttempts.path);
  protected readonly attempts = signal<readonly AttemptSummary[] | null>(null);
  protected readonly nextCursor = signal<string | null>(null);
  protected readonly failure = signal<ApiFailure | null>(null);
  protected readonly q = signal('');
  private readonly typed = new Subject<void>();

  constructor() {
    void this.load();
    merge(this.typed, inject(EventFeed).follow(['attempts']))
      .pipe(debounceTime(GATHER_MS), takeUntilDestroyed(inject(DestroyRef)))
      .subscribe(() => void this.load());
  }

  protected search(text: string): void {
    this.q.set(text);
    this.typed.next();
  }

  protected async load(): Promise<void> {
    await this.fetch(null);
  }

  protected async loadMore(): Promise<void> {
    await this.fetch(this.nextCursor());
  }

  private async fetch(cursor: string | null): Promise<void> {
    const q = this.q().trim();
    try {
      const page = await this.api.call(listAttempts, {
        query: {limit: PAGE, ...(cursor ? {cursor} : {}), ...(q ? {q} : {})},
      });
      this.failure.set(null);
      this.attempts.update((old) => (cursor ? [...(old ?? []), ...page.items] : page.items));
      this.nextCursor.set(page.nextCursor);
    } catch (error) {
      this.failure.set(toApiFailure(error)); // what was shown stays
    }
  }
}
