import {ChangeDetectionStrategy, Component, computed, inject, signal} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {BenchStore} from './bench-store';

const SEEN = 'evenspan.first-steps-seen';

/** What to try on a first visit, one line at a time, at the edge of the page. */
@Component({
  selector: 'app-first-steps',
  template: `
    @if (line(); as text) {
      <p class="sheet">
        <span>{{ text }}</span>
        <button matButton type="button" (click)="dismiss()">Close</button>
      </p>
    }
  `,
  styles: `
    p {
      display: flex;
      gap: 1rem;
      align-items: center;
      justify-content: space-between;
      margin: 0 0 0.75rem;
      padding: 0.25rem 1rem;
    }
  `,
  imports: [MatButtonModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FirstSteps {
  private readonly store = inject(BenchStore);
  private readonly isDismissed = signal(localStorage.getItem(SEEN) !== null);

  protected readonly line = computed(() => {
    if (this.isDismissed()) return null;
    if (!this.store.hasStarted())
      return 'Press “Start the line” and watch the web, the brake and the trend.';
    if (!this.store.hasStopped()) {
      return this.changedGain()
        ? 'Now stop the line. See the loop? Raise the stop-hold boost and stop again.'
        : 'Turn the gain up until the tension hunts, then halve it.';
    }
    if (this.store.rollSize() === 'half')
      return 'Same settings, small roll: press “Small roll” and start again.';
    return null;
  });

  private readonly changedGain = computed(() =>
    this.store.run.entries().some((entry) => entry.kind === 'set' && 'kp' in entry.set),
  );

  protected dismiss(): void {
    localStorage.setItem(SEEN, 'yes');
    this.isDismissed.set(true);
  }
}
