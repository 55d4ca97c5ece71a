import {ChangeDetectionStrategy, Component, computed, input, output} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {type ApiFailure} from '../../platform/api-failure';

/** Why nothing more of an attempt is sent, and what a person can do about it. */
@Component({
  selector: 'app-stopped-notice',
  template: `
    <div class="sheet notice" role="alert">
      <p>{{ sentence() }}</p>
      @for (fault of faults(); track $index) {
        <p class="number">{{ fault }}</p>
      }
      @if (failure().code === 'writer-changed') {
        <button matButton="filled" type="button" (click)="takenOver.emit()">
          Go on here instead
        </button>
      } @else {
        <button matButton="outlined" type="button" (click)="triedAgain.emit()">
          {{ failure().code === 'not-signed-in' ? 'Sign in and send' : 'Try again' }}
        </button>
        @if (failure().requestId; as id) {
          <p class="muted">
            Number for support: <span class="number">{{ id }}</span>
          </p>
        }
      }
    </div>
  `,
  styleUrl: './notice.scss',
  imports: [MatButtonModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class StoppedNotice {
  readonly failure = input.required<ApiFailure>();

  readonly takenOver = output();
  readonly triedAgain = output();

  protected readonly sentence = computed(() => sentenceOf(this.failure()));
  /** Which entry was refused and why; places are counted from one for people. */
  protected readonly faults = computed(() =>
    (this.failure().problem?.errors ?? []).map(({path, message}) => {
      const [, place, key] = /^body\.entries\.(\d+)\.(.+)$/.exec(path) ?? [];
      if (place === undefined) return `${path}: ${message}`;
      return `Entry ${Number(place) + 1}, ${key ?? ''}: ${message}`;
    }),
  );
}

function sentenceOf({code, message}: ApiFailure): string {
  switch (code) {
    case 'writer-changed':
      return 'This attempt goes on on another device. What you ran here is kept on this one.';
    case 'not-signed-in':
      return 'You are signed out. What you ran is kept on this device. Sign in to send it.';
    case 'attempt-over':
      return 'This attempt was handed in before. What you ran since then is kept on this device.';
    case 'batch-differs':
      return 'The server has other entries under the same number. Nothing more is sent; everything is kept on this device.';
    case 'batch-missing':
      return 'The server misses a part that this device no longer has. Nothing more is sent; everything is kept on this device.';
    case 'entry-refused':
      return 'The server refused an entry, so nothing more is sent. Everything is kept on this device.';
    default:
      return `The server refused what this attempt sent: ${message} Everything is kept on this device.`;
  }
}
