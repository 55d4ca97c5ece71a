import {ChangeDetectionStrategy, Component} from '@angular/core';

/** The product's own mark: a roll with its web leaving. Decoration; the name stands beside it. */
@Component({
  selector: 'app-mark',
  template: `
    <svg viewBox="0 0 32 32" aria-hidden="true" focusable="false">
      <circle cx="13" cy="18" r="9" />
      <circle cx="13" cy="18" r="2" />
      <path d="M13 9H30" />
    </svg>
  `,
  styles: `
    :host {
      display: block;
    }
    svg {
      display: block;
      width: 100%;
      fill: none;
      stroke: var(--pine);
      stroke-width: 2.6;
      stroke-linecap: round;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Mark {}
