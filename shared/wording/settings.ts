import {type Quantity, type UnitSystem, written} from '../units';

/** A setting as people call it, and the quantity it is shown in. */
export interface SettingWords {
  readonly name: string;
  readonly quantity: Quantity;
  /** Shown value = stored value × this; a radius is shown as a diameter, a fraction in percent. */
  readonly times?: number;
  /** Steps by a factor (gain, times) or by this much [stored unit]. */
  readonly step: 'factor' | number;
  readonly canBeOff?: boolean;
}

/** Every setting that the screens show, by its key. Never Kp or Ti. */
export const SETTING_WORDS: Readonly<Record<string, SettingWords>> = {
  setPointN: {name: 'Tension set point', quantity: 'tension', step: 5},
  kp: {name: 'Gain', quantity: 'gain', step: 'factor'},
  tiS: {name: 'Integral time', quantity: 'time', step: 'factor', canBeOff: true},
  tdS: {name: 'Derivative time', quantity: 'time', step: 'factor', canBeOff: true},
  inputFilterS: {name: 'Input filter', quantity: 'time', step: 'factor', canBeOff: true},
  setPointRateNps: {
    name: 'Set point rate, per second',
    quantity: 'tension',
    step: 5,
    canBeOff: true,
  },
  outMinPct: {name: 'Least output', quantity: 'percent', step: 1},
  outMaxPct: {name: 'Greatest output', quantity: 'percent', step: 1},
  manualPct: {name: 'Output by hand', quantity: 'percent', step: 0.5},
  startRampS: {name: 'Start ramp', quantity: 'time', step: 'factor', canBeOff: true},
  startFraction: {name: 'Start ramp begins at', quantity: 'percent', times: 100, step: 0.05},
  stopHoldGain: {name: 'Stop-hold boost', quantity: 'factor', step: 0.05},
  stopHoldS: {name: 'Boost time', quantity: 'time', step: 'factor', canBeOff: true},
  standstillPct: {name: 'Holding brake', quantity: 'percent', step: 1},
  inertiaAssistPct: {name: 'Inertia assist', quantity: 'percent', step: 5, canBeOff: true},
  zeroAdjustN: {name: 'Zero correction', quantity: 'tension', step: 0.5},
  spanAdjustPct: {name: 'Span correction', quantity: 'percent', step: 0.5},
  radiusRefM: {name: 'Reference diameter', quantity: 'diameter', times: 2, step: 0.01},
  radiusEnteredM: {name: 'Diameter entered', quantity: 'diameter', times: 2, step: 0.005},
};

/** A setting's name on the screen. */
export function settingName(key: string): string {
  const words = SETTING_WORDS[key];
  if (words !== undefined) return words.name;
  if (key === 'mode') return 'Mode';
  if (key === 'radiusCompensation') return 'Gain with diameter';
  return key.replace(/(Pct|S|N|M)$/, '').replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);
}

/** A setting's value on the screen, with its unit. */
export function settingValue(key: string, value: unknown, units: UnitSystem): string {
  const words = SETTING_WORDS[key];
  if (value === null) return 'off';
  if (typeof value === 'boolean') return value ? 'on' : 'off';
  if (typeof value === 'string') return value;
  if (words === undefined || typeof value !== 'number') return JSON.stringify(value);
  if (value === 0 && words.canBeOff === true) return 'off';
  return written(words.quantity, value * (words.times ?? 1), units);
}

/** What is needed to say what a value means on this stand. */
export interface StandFacts {
  /** Range of the sensor [N]. */
  readonly rangeN: number;
  /** Values of the other settings in force. */
  readonly settings: Readonly<Record<string, unknown>>;
}

/** One line that says what a value means here, under 25 words; empty where there is nothing to say. */
export function settingMeaning(
  key: string,
  value: number,
  facts: StandFacts,
  units: UnitSystem,
): string {
  switch (key) {
    case 'kp': {
      const oneN = written('tension', units === 'si' ? 1 : 4.4482216152605, units);
      const perN = ((value * 100) / facts.rangeN) * (units === 'si' ? 1 : 4.4482216152605);
      return `${oneN} too low gives ${Number(perN.toPrecision(2))} % more brake at once.`;
    }
    case 'tiS':
      return value === 0
        ? 'Off: a small error stays for good.'
        : 'Shorter is stronger. A lasting error repeats the first push every such time.';
    case 'setPointN':
      return 'The tension that the controller is told to hold.';
    case 'startRampS':
      return 'Time from the first share of the set point to all of it.';
    case 'startFraction':
      return 'The start ramp begins at this share of the set point.';
    case 'stopHoldGain':
      return `While stopping the brake gets ${value.toFixed(2)} times what it had.`;
    case 'stopHoldS':
      return value === 0
        ? 'Off: the loop stays on until the line stands.'
        : 'Counted from the stop command. Too long locks tension in.';
    case 'standstillPct':
      return 'Brake output while the line stands.';
    case 'tdS':
      return value === 0
        ? 'Off, as on most load-cell stands.'
        : 'Reacts to how fast tension changes; also to noise.';
    case 'inputFilterS':
      return value === 0 ? 'Off.' : 'Calms the reading, and delays it.';
    default:
      return '';
  }
}
