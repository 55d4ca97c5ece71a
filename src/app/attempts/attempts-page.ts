import {DatePipe, DecimalPipe} from '@angular/common';
import {ChangeDetectionStrategy, Component, inject, signal} from '@angular/core';
import {takeUntilDestroyed} from '@angular/core/rxjs-interop';
import {MatButtonModule} from '@angular/material/button';
import {MatFormFieldModule} from '@angular/material/form-field';
import {MatInputModule} from '@angular/material/input';
import {RouterLink} from '@angular/router';
import {debounceTime, Subject} from 'rxjs';
import {downloadAttempts} from '#shared/attempts/attempt';
import {urlOf} from '../platform/api-caller';
import {EventFeed} from '../platform/event-feed';
import {PageState} from '../ui/page-state';
import {AttemptsList} from './attempts-list';

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
  providers: [AttemptsList],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AttemptsPage {
  protected readonly list = inject(AttemptsList);

  protected readonly csvUrl = urlOf(downloadAttempts.path);
  protected readonly q = signal('');
  private readonly typed = new Subject<string>();

  constructor() {
    void this.list.find('');
    this.typed
      .pipe(debounceTime(GATHER_MS), takeUntilDestroyed())
      .subscribe((q) => void this.list.find(q));
    inject(EventFeed)
      .follow(['attempts'])
      .pipe(debounceTime(GATHER_MS), takeUntilDestroyed())
      .subscribe(() => void this.list.refresh());
  }

  protected search(text: string): void {
    this.q.set(text);
    this.typed.next(text);
  }
}
