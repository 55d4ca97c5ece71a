import {ChangeDetectionStrategy, Component, inject, signal} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {BenchStore} from './bench-store';

/** Keyboard shortcuts of the Bench, and the sheet that names them. */
@Component({
  selector: 'app-bench-keys',
  template: `
    <button matButton type="button" [attr.aria-expanded]="isOpen()" (click)="isOpen.set(!isOpen())">
      Keys
    </button>
    @if (isOpen()) {
      <dl class="sheet">
        @for (key of keys; track key.name) {
          <dt>
            <kbd>{{ key.name }}</kbd>
          </dt>
          <dd>{{ key.does }}</dd>
        }
      </dl>
    }
  `,
  styles: `
    :host {
      position: relative;
    }
    dl {
      position: absolute;
      z-index: 5;
      right: 0;
      display: grid;
      grid-template-columns: auto 1fr;
      gap: 0.35rem 0.9rem;
      width: 15rem;
      margin: 0.25rem 0 0;
      padding: 0.9rem;
    }
    dd {
      margin: 0;
    }
    kbd {
      padding: 0.05rem 0.45rem;
      border: 1px solid var(--line);
      border-radius: 4px;
      font: inherit;
    }
  `,
  imports: [MatButtonModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: {'(document:keydown)': 'press($event)'},
})
export class BenchKeys {
  private readonly store = inject(BenchStore);

  protected readonly isOpen = signal(false);
  protected readonly keys = [
    {name: 'S', does: 'start the line'},
    {name: 'X', does: 'stop the line'},
    {name: 'P', does: 'pause and go on'},
    {name: '.', does: 'one step, while paused'},
    {name: 'T', does: 'thread again'},
    {name: 'A', does: 'same again'},
  ];

  protected press(event: KeyboardEvent): void {
    const {target} = event;
    const isTyping =
      target instanceof HTMLElement && target.closest('input, textarea, select') !== null;
    if (isTyping || event.ctrlKey || event.metaKey || event.altKey) return;
    const {run} = this.store;
    const isRunning = run.outcome().kind === 'running';
    switch (event.key.toLowerCase()) {
      case 's':
        if (isRunning) void this.store.command({command: 'run', speedMps: 2, rampS: 10});
        break;
      case 'x':
        if (isRunning) void this.store.command({command: 'stop', rampS: 4});
        break;
      case 'p':
        this.store.togglePause();
        break;
      case '.':
        if (run.pauseReason() !== null) void run.advance(1);
        break;
      case 't':
        if (!isRunning) void this.store.threadAgain();
        break;
      case 'a':
        void this.store.sameAgain();
        break;
    }
  }
}
