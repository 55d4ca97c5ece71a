import {
  ChangeDetectionStrategy,
  Component,
  effect,
  ElementRef,
  model,
  output,
  viewChild,
} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';

/** Hands an attempt in, after asking: there is no way back. */
@Component({
  selector: 'app-hand-in',
  template: `
    @if (isAsking()) {
      <div class="asking" role="group" aria-label="Hand in?">
        <span>Hand in now? You cannot go on afterwards.</span>
        <button #yes matButton="filled" type="button" (click)="handedIn.emit()">
          Yes, hand in
        </button>
        <button matButton="outlined" type="button" (click)="isAsking.set(false)">Not yet</button>
      </div>
    } @else {
      <button #ask matButton="filled" type="button" (click)="isAsking.set(true)">Hand in</button>
    }
  `,
  styles: `
    .asking {
      display: flex;
      flex-wrap: wrap;
      gap: 0.5rem 1rem;
      align-items: center;
    }
  `,
  imports: [MatButtonModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class HandIn {
  readonly isAsking = model(false);

  readonly handedIn = output();

  private readonly yes = viewChild<unknown, ElementRef<HTMLElement>>('yes', {read: ElementRef});
  private readonly ask = viewChild<unknown, ElementRef<HTMLElement>>('ask', {read: ElementRef});

  constructor() {
    let wasAsking = false;
    // The button that was pressed is gone: the keyboard goes on at what took its place.
    effect(() => {
      const isAsking = this.isAsking();
      const next = isAsking ? this.yes() : this.ask();
      if (isAsking !== wasAsking && next !== undefined) {
        wasAsking = isAsking;
        next.nativeElement.focus();
      }
    });
  }
}
