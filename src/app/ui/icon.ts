import {ChangeDetectionStrategy, Component, computed, input} from '@angular/core';
import {type IconName, ICONS} from './icons';

/** A small picture beside words. Decoration: whoever uses it alone must name the control. */
@Component({
  selector: 'app-icon',
  template: `<svg viewBox="0 -960 960 960" aria-hidden="true" focusable="false">
    <path [attr.d]="path()" />
  </svg>`,
  styles: `
    :host {
      display: inline-block;
      width: 1.5rem;
      height: 1.5rem;
      flex: none;
      vertical-align: middle;
    }
    svg {
      display: block;
      width: 100%;
      height: 100%;
      fill: currentColor;
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class Icon {
  readonly name = input.required<IconName>();

  protected readonly path = computed(() => ICONS[this.name()]);
}
