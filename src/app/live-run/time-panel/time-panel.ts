import {ChangeDetectionStrategy, Component, input, output} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {MatButtonToggleModule} from '@angular/material/button-toggle';
import {type PauseReason} from '../live-run';

/** How fast simulated time goes: pause, one step, ×1 to ×20. */
@Component({
  selector: 'app-time-panel',
  template: `
    @if (canPause()) {
      <button
        matButton="outlined"
        type="button"
        class="pause"
        [disabled]="reason() === 'over' || reason() === 'notStarted'"
        (click)="pauseToggled.emit()"
      >
        {{ reason() === null || reason() === 'notStarted' ? 'Pause' : 'Go on' }}
      </button>
    }
    @if (canStep()) {
      <button
        matButton="outlined"
        type="button"
        [disabled]="reason() === null || reason() === 'over'"
        (click)="stepped.emit()"
      >
        One step
      </button>
    }
    @if (factors().length > 1) {
      <mat-button-toggle-group
        aria-label="Speed of simulated time"
        hideSingleSelectionIndicator
        [value]="factor()"
        (change)="factorChosen.emit($event.value)"
      >
        @for (choice of factors(); track choice) {
          <mat-button-toggle [value]="choice">×{{ choice }}</mat-button-toggle>
        }
      </mat-button-toggle-group>
    }
  `,
  styles: `
    :host {
      display: flex;
      flex-wrap: wrap;
      gap: 0.5rem;
      align-items: center;
    }
    button {
      --mat-button-outlined-horizontal-padding: 0.9rem;
    }
    .pause {
      min-width: 5rem;
    }
  `,
  imports: [MatButtonModule, MatButtonToggleModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TimePanel {
  readonly reason = input.required<PauseReason | null>();
  readonly factor = input(1);
  readonly factors = input<readonly number[]>([1, 2, 5, 20]);
  readonly canPause = input(true);
  readonly canStep = input(true);

  readonly pauseToggled = output();
  readonly stepped = output();
  readonly factorChosen = output<number>();
}
