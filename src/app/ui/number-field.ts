import {
  booleanAttribute,
  ChangeDetectionStrategy,
  Component,
  computed,
  input,
  linkedSignal,
  output,
} from '@angular/core';
import {parseNumber} from '#shared/units';
import {Icon} from './icon';

const FACTOR = 1.1;
const BIG_FACTOR = 1.5;
const BIG_STEPS = 5;
let made = 0;

/**
 * One number with its unit: type it (comma or point), step it by buttons or arrow keys, Shift for more.
 * What was typed stays until it is a value that is allowed.
 */
@Component({
  selector: 'app-number-field',
  templateUrl: './number-field.html',
  styleUrl: './number-field.scss',
  imports: [Icon],
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: {'[class.compact]': 'isCompact()'},
})
export class NumberField {
  readonly label = input.required<string>();
  /** The value in force, in the person's unit. */
  readonly value = input.required<number>();
  readonly unit = input('');
  readonly lowest = input.required<number>();
  readonly highest = input.required<number>();
  /** `factor`: ×1.1, with Shift ×1.5; a number: this much, with Shift five times as much. */
  readonly step = input<'factor' | number>(1);
  /** Whether "off" (stored as 0) is a choice of its own beside the range. */
  readonly canBeOff = input(false);
  /** Why it can't be changed; empty when it can. */
  readonly lockedBecause = input('');
  readonly hint = input('');
  /** In a sentence: no buttons, a note only when something is wrong. */
  readonly isCompact = input(false, {transform: booleanAttribute});

  readonly valueChosen = output<number>();

  protected readonly id = `number-field-${made++}`;
  protected readonly isOff = computed(() => this.canBeOff() && this.value() === 0);
  protected readonly isLocked = computed(() => this.lockedBecause() !== '');
  /** What stands in the box; follows the value until somebody types. */
  protected readonly draft = linkedSignal(() => (this.isOff() ? 'off' : asText(this.value())));
  protected readonly error = linkedSignal({source: this.value, computation: () => ''});

  protected type(text: string): void {
    this.draft.set(text);
    this.error.set('');
  }

  protected commit(): void {
    const text = this.draft();
    if (text === (this.isOff() ? 'off' : asText(this.value()))) return;
    const number = parseNumber(text);
    if (this.canBeOff() && /^(off|0)$/i.test(text.trim())) this.choose(0);
    else if (number === null) this.error.set(`“${text}” is not a number.`);
    else if (number < this.lowest() || number > this.highest()) this.error.set(this.allowed());
    else this.choose(number);
  }

  protected revert(): void {
    this.draft.set(this.isOff() ? 'off' : asText(this.value()));
    this.error.set('');
  }

  protected stepBy(direction: 1 | -1, isBig: boolean): void {
    if (this.isLocked()) return;
    if (this.isOff()) {
      if (direction > 0) this.choose(this.lowest());
      return;
    }
    const next = this.stepped(direction, isBig);
    // Below the shortest comes "off" only by its own button: who goes down wants less, not none.
    this.choose(Math.min(this.highest(), Math.max(this.lowest(), next)));
  }

  protected toggleOff(): void {
    if (this.isOff()) this.choose(Math.min(this.highest(), Math.max(this.lowest(), 1)));
    else this.choose(0);
  }

  protected onKey(event: KeyboardEvent): void {
    if (event.key === 'ArrowUp' || event.key === 'ArrowDown') {
      event.preventDefault();
      this.stepBy(event.key === 'ArrowUp' ? 1 : -1, event.shiftKey);
    } else if (event.key === 'Enter') this.commit();
    else if (event.key === 'Escape') this.revert();
  }

  private stepped(direction: 1 | -1, isBig: boolean): number {
    const step = this.step();
    const value = this.value();
    if (step !== 'factor') return rounded(value + direction * step * (isBig ? BIG_STEPS : 1));
    const factor = isBig ? BIG_FACTOR : FACTOR;
    return rounded(direction > 0 ? value * factor : value / factor);
  }

  private choose(value: number): void {
    this.error.set('');
    if (value !== this.value()) this.valueChosen.emit(value);
    else this.revert();
  }

  private allowed(): string {
    const range = `${asText(this.lowest())} to ${asText(this.highest())} ${this.unit()}`.trim();
    return `Allowed: ${range}${this.canBeOff() ? ', or off' : ''}.`;
  }
}

/** Three digits that mean something: more would only be the step's own noise. */
function rounded(value: number): number {
  return Number(value.toPrecision(3));
}

function asText(value: number): string {
  return String(Number(value.toPrecision(4)));
}
