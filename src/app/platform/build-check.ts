import {computed, Injectable, signal} from '@angular/core';

/** Knows when the server has moved to another build than the page came with. */
@Injectable({providedIn: 'root'})
export class BuildCheck {
  private readonly first = signal<string | null>(null);
  private readonly last = signal<string | null>(null);
  private readonly runs = signal(0);

  /** Whether to offer a reload: another build, and no run going that a reload would stop. */
  readonly offersReload = computed(() => this.first() !== this.last() && this.runs() === 0);

  note(build: string | null): void {
    if (build === null) return;
    if (this.first() === null) this.first.set(build);
    this.last.set(build);
  }

  /** A run began; call the returned function when it is over. */
  holdDuringRun(): () => void {
    this.runs.update((count) => count + 1);
    let isHeld = true;
    return () => {
      if (isHeld) this.runs.update((count) => count - 1);
      isHeld = false;
    };
  }
}
