import {
  ChangeDetectionStrategy,
  Component,
  computed,
  inject,
  linkedSignal,
  signal,
} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {BenchStore} from './bench-store';

const SEEN = 'evenspan.first-steps-seen';
const STEPS = 5;

/** What to try on a first visit, one line at a time, at the edge of the page. */
@Component({
  selector: 'app-first-steps',
  template: `
    @if (line(); as text) {
      <p>
        <span class="muted number">{{ step() + 1 }}/{{ steps }}</span>
        <span class="text">{{ text }}</span>
        <button matButton type="button" (click)="dismiss()">Close</button>
      </p>
    }
  `,
  styles: `
    p {
      display: flex;
      gap: 0.75rem;
      align-items: center;
      margin: 0;
      padding-left: 0.75rem;
      background: var(--pine-soft);
      border-left: 4px solid var(--pine);
      border-radius: 4px;
    }
    .text {
      flex: 1;
      padding: 0.35rem 0;
      line-height: 1.3;
    }
  `,
  imports: [MatButtonModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class FirstSteps {
  private readonly store = inject(BenchStore);
  private readonly isDismissed = signal(isSeen());

  protected readonly steps = STEPS;
  /** Only ever goes on: a new run does not begin the prompts anew. */
  protected readonly step = linkedSignal<number, number>({
    source: () => this.reached(),
    computation: (reached, previous) => Math.max(reached, previous?.value ?? 0),
  });
  protected readonly line = computed(() => (this.isDismissed() ? null : this.lineOf(this.step())));

  private readonly reached = computed(() => {
    if (this.store.rollSize() === 'small') return this.store.hasStarted() ? STEPS : 4;
    if (this.store.hasStopped()) return this.changed('stopHoldGain') ? 4 : 3;
    if (!this.store.hasStarted()) return 0;
    return this.changed('kp') ? 2 : 1;
  });

  protected dismiss(): void {
    this.isDismissed.set(true);
    try {
      localStorage.setItem(SEEN, 'yes');
    } catch {
      // storage refused by the browser: the prompts come again next time
    }
  }

  private lineOf(step: number): string | null {
    switch (step) {
      case 0:
        return 'Press “Start the line” and watch the web, the brake and the trend.';
      case 1:
        return 'Turn the gain up until the tension hunts, then halve it. Shift and a press is a big step.';
      case 2:
        return 'Now stop the line.';
      case 3:
        return this.hasLoop()
          ? 'See the loop? Raise the stop-hold boost, start, and stop again.'
          : 'See the tension sink in the stop? Raise the stop-hold boost, start, and stop again.';
      case 4:
        return 'Same settings, small roll: press “Small roll” and start. The same gain is stronger there.';
      default:
        return null;
    }
  }

  private hasLoop(): boolean {
    return this.store.run.events().some(({kind}) => kind === 'slackBegan');
  }

  private changed(key: string): boolean {
    return this.store.run.entries().some((entry) => entry.kind === 'set' && key in entry.set);
  }
}

function isSeen(): boolean {
  try {
    return localStorage.getItem(SEEN) !== null;
  } catch {
    return false; // storage refused by the browser
  }
}
