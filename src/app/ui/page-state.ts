import {ChangeDetectionStrategy, Component, computed, input, output} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {MatProgressBarModule} from '@angular/material/progress-bar';
import {type ApiFailure} from '../platform/api-failure';

/** What a page shows while there is nothing to show: loading, or why it failed and how to go on. */
@Component({
  selector: 'app-page-state',
  template: `
    @if (failure(); as failed) {
      <div class="sheet block" role="alert">
        <h2>{{ title() }}</h2>
        <p>{{ sentence() }}</p>
        @if (failed.requestId; as id) {
          <p class="muted">
            Number for support: <span class="number">{{ id }}</span>
          </p>
        }
        <button matButton="outlined" type="button" (click)="retried.emit()">Try again</button>
      </div>
    } @else {
      <div class="block" role="status">
        <p class="muted">{{ label() }}</p>
        <mat-progress-bar mode="indeterminate" [attr.aria-label]="label()" />
      </div>
    }
  `,
  styles: `
    .block {
      max-width: 40rem;
      padding: 1.5rem;
    }
  `,
  imports: [MatButtonModule, MatProgressBarModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class PageState {
  /** What is being fetched, as a sentence. */
  readonly label = input('Loading …');
  readonly failure = input<ApiFailure | null>(null);
  readonly retried = output();

  protected readonly title = computed(() => {
    switch (this.failure()?.code) {
      case 'offline':
        return 'No connection';
      case 'not-found':
        return 'Not found';
      case 'not-allowed':
        return 'Not for your role';
      default:
        return 'That did not work';
    }
  });

  protected readonly sentence = computed(() => {
    const failure = this.failure();
    switch (failure?.code) {
      case 'offline':
        return 'The server did not answer. What you ran is kept on this device. Check the connection, then try again.';
      case 'not-found':
        return 'It does not exist, or it belongs to another organisation.';
      default:
        return failure?.message ?? '';
    }
  });
}
