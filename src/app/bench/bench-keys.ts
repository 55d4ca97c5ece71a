import {ChangeDetectionStrategy, Component, output, signal} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';

export type BenchKey = 'start' | 'stop' | 'pause' | 'step' | 'thread' | 'again';

const KEYS: Readonly<Record<string, {readonly key: BenchKey; readonly does: string}>> = {
  S: {key: 'start', does: 'start the line, or change its speed'},
  X: {key: 'stop', does: 'stop the line'},
  P: {key: 'pause', does: 'pause and go on'},
  '.': {key: 'step', does: 'one step, while paused'},
  T: {key: 'thread', does: 'thread again, after a break'},
  A: {key: 'again', does: 'same again, from the beginning'},
};

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
      width: 17rem;
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
  readonly pressed = output<BenchKey>();

  protected readonly isOpen = signal(false);
  protected readonly keys = Object.entries(KEYS).map(([name, {does}]) => ({name, does}));

  protected press(event: KeyboardEvent): void {
    if (event.key === 'Escape') this.isOpen.set(false);
    const isTyping =
      event.target instanceof HTMLElement &&
      event.target.closest('input, textarea, select, [contenteditable]') !== null;
    if (isTyping || event.repeat || event.ctrlKey || event.metaKey || event.altKey) return;
    const found = KEYS[event.key.toUpperCase()];
    if (found !== undefined) this.pressed.emit(found.key);
  }
}
