import {ChangeDetectionStrategy, Component, computed, input, output, signal} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {MatSlideToggleModule} from '@angular/material/slide-toggle';
import {FIELDS, type LiveSettings, type Scenario} from '#sim-core/index';
import {fromPerson, toPerson, unitName, type UnitSystem, written} from '#shared/units';
import {SETTING_WORDS, settingMeaning} from '#shared/wording/settings';
import {NumberField} from '../../ui/number-field';
import {FIRST_KEYS, SETTING_GROUPS} from './setting-groups';

/** What may be changed here: a range by key (SI); null lets everything be changed. */
export type AllowedSettings = Readonly<
  Record<string, {readonly lowest?: number | undefined; readonly highest?: number | undefined}>
> | null;

interface Field {
  readonly key: string;
  readonly label: string;
  readonly unit: string;
  readonly value: number;
  readonly lowest: number;
  readonly highest: number;
  readonly step: 'factor' | number;
  readonly canBeOff: boolean;
  readonly lockedBecause: string;
  readonly hint: string;
}

/** Ranges that make sense to people; the engine itself takes more. [SI] */
const SENSIBLE: Readonly<Record<string, readonly [number, number]>> = {
  kp: [0.01, 5],
  tiS: [0.05, 20],
  tdS: [0.01, 5],
  inputFilterS: [0.02, 5],
  startRampS: [0.1, 60],
  stopHoldGain: [0.2, 4],
  stopHoldS: [0.1, 60],
  setPointRateNps: [1, 500],
  radiusRefM: [0.03, 1],
};

/** The controller's settings: few at first, the rest when they matter. Changes act at once. */
@Component({
  selector: 'app-settings-panel',
  templateUrl: './settings-panel.html',
  styleUrl: './settings-panel.scss',
  imports: [MatButtonModule, MatSlideToggleModule, NumberField],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class SettingsPanel {
  readonly settings = input.required<Readonly<Record<string, unknown>>>();
  readonly document = input.required<Scenario>();
  readonly units = input<UnitSystem>('si');
  readonly allowed = input<AllowedSettings>(null);
  /** Groups that matter by now: after the first start, after the first stop. */
  readonly shownGroups = input<readonly string[]>([]);
  readonly areFixed = input(false);

  readonly changed = output<LiveSettings>();

  protected readonly showsMore = signal(false);
  protected readonly groups = computed(() =>
    SETTING_GROUPS.map(({title, keys}) => ({
      title,
      fields: keys.filter((key) => this.isShown(title, key)).flatMap((key) => this.fieldOf(key)),
      hasCompensation: title === 'Diameter' && this.isShown(title, 'radiusCompensation'),
    })).filter(({fields, hasCompensation}) => fields.length > 0 || hasCompensation),
  );
  protected readonly compensates = computed(() => this.settings()['radiusCompensation'] === true);
  protected readonly isCompensationLocked = computed(
    () => this.lockOf('radiusCompensation') !== '',
  );

  protected choose(field: Field, shown: number): void {
    const words = SETTING_WORDS[field.key]!;
    const si = fromPerson(words.quantity, shown, this.units()) / (words.times ?? 1);
    this.changed.emit({[field.key]: si});
  }

  protected compensate(isOn: boolean): void {
    const radiusRefM = this.settings()['radiusRefM'] ?? this.document().roll.radiusM;
    this.changed.emit(
      isOn
        ? {radiusCompensation: true, radiusRefM: radiusRefM as number}
        : {radiusCompensation: false},
    );
  }

  private isShown(group: string, key: string): boolean {
    if (this.showsMore()) return true;
    const allowed = this.allowed();
    if (allowed !== null) return key in allowed || key === 'setPointN';
    return FIRST_KEYS.includes(key) || this.shownGroups().includes(group);
  }

  private lockOf(key: string): string {
    if (this.areFixed()) return 'The run is over.';
    const allowed = this.allowed();
    return allowed !== null && !(key in allowed) ? 'Fixed in this exercise.' : '';
  }

  private fieldOf(key: string): Field[] {
    const words = SETTING_WORDS[key];
    const stored = this.settings()[key];
    if (words === undefined || typeof stored !== 'number') return [];
    const times = words.times ?? 1;
    const shown = (si: number): number =>
      Number(toPerson(words.quantity, si * times, this.units()).toPrecision(5));
    const [lowest, highest] = this.rangeOf(key);
    const facts = {rangeN: rangeOf(this.document()), settings: this.settings()};
    return [
      {
        key,
        label: words.name,
        unit: unitName(words.quantity, this.units()),
        value: shown(stored),
        lowest: shown(lowest),
        highest: shown(highest),
        step: words.step === 'factor' ? 'factor' : Math.abs(shown(words.step) - shown(0)),
        canBeOff: words.canBeOff === true && this.allowed()?.[key]?.lowest === undefined,
        lockedBecause: this.lockOf(key),
        hint: this.perWidth(key, stored) + settingMeaning(key, stored, facts, this.units()),
      },
    ];
  }

  /** Tension per width: the job card says the one, the controller the other. */
  private perWidth(key: string, tensionN: number): string {
    if (key !== 'setPointN') return '';
    const perWidth = tensionN / this.document().web.widthM;
    return `${written('tensionPerWidth', perWidth, this.units())} of width. `;
  }

  /** Range that is allowed here [SI]. */
  private rangeOf(key: string): readonly [number, number] {
    const field = FIELDS.find(({path}) => path === `controller.${key}`);
    const [lowest, highest] = SENSIBLE[key] ?? [field?.lowest ?? 0, field?.highest ?? 100];
    const top = key === 'setPointN' ? 0.9 * rangeOf(this.document()) : highest;
    const allowed = this.allowed()?.[key];
    return [allowed?.lowest ?? lowest, allowed?.highest ?? top];
  }
}

/** Range of the sensor, or twice the set point for a dancer [N]. */
function rangeOf({sensing, controller}: Scenario): number {
  return sensing.kind === 'loadCell' ? sensing.rangeN : 2 * controller.setPointN;
}
