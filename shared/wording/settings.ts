import {type Quantity, type UnitSystem, written} from '../units';
import {SETTING_MEANINGS, type StandFacts} from './setting-meanings';

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

/** Names of the settings that have no field of their own yet. */
const OTHER_NAMES: Readonly<Record<string, string>> = {
  mode: 'Mode',
  derivativeN: 'Derivative filter',
  setPointWeight: 'Set point weight',
  startOutputPct: 'Start output',
  closeAboveN: 'Start output ends above',
  startHoldS: 'Start output lasts',
  fastStopGain: 'Boost at a fast stop',
  fastStopHoldS: 'Boost time at a fast stop',
  radiusCompensation: 'Gain with diameter',
  gainByRadius: 'Gain by diameter',
  radiusSource: 'Diameter comes from',
  caliperEnteredM: 'Thickness entered',
  inputSign: 'Sensor direction',
  antiWindup: 'At a limit',
  trackingS: 'Tracking time',
  bumpless: 'Change over without a jump',
  outRatePctPerS: 'Output rate, per second',
  outStepPct: 'Output resolution',
};

/** Quantities of those among them that are numbers. */
const PLAIN_NUMBERS: Readonly<
  Record<string, Pick<SettingWords, 'quantity' | 'times' | 'canBeOff'>>
> = {
  startOutputPct: {quantity: 'percent'},
  closeAboveN: {quantity: 'tension'},
  startHoldS: {quantity: 'time'},
  fastStopGain: {quantity: 'factor'},
  fastStopHoldS: {quantity: 'time'},
  caliperEnteredM: {quantity: 'thickness'},
  trackingS: {quantity: 'time'},
  outRatePctPerS: {quantity: 'percent', canBeOff: true},
  outStepPct: {quantity: 'percent', canBeOff: true},
};

/** Values that are words or signs, by key and value. */
const CHOICES: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  antiWindup: {conditional: 'stops adding', backCalculation: 'gives back', none: 'keeps adding'},
  inputSign: {'1': 'as wired', '-1': 'turned round'},
  radiusSource: {
    true: 'the roll itself',
    counted: 'counted turns',
    ratio: 'line and roll speed',
  },
};

/** A setting's name on the screen; its key, where there is no such setting. */
export function settingName(key: string): string {
  return SETTING_WORDS[key]?.name ?? OTHER_NAMES[key] ?? key;
}

/** A setting's value on the screen, with its unit. */
export function settingValue(key: string, value: unknown, units: UnitSystem): string {
  if (value === null) return 'off';
  if (typeof value === 'string' || typeof value === 'number') {
    const choice = CHOICES[key]?.[value];
    if (choice !== undefined) return choice;
  }
  if (typeof value === 'boolean') return value ? 'on' : 'off';
  if (typeof value === 'string') return value;
  if (Array.isArray(value)) return value.length === 1 ? '1 point' : `${value.length} points`;
  if (typeof value !== 'number') return JSON.stringify(value);
  const words = SETTING_WORDS[key] ?? PLAIN_NUMBERS[key];
  if (words === undefined) return `${value}`;
  if (value === 0 && words.canBeOff === true) return 'off';
  return written(words.quantity, value * (words.times ?? 1), units);
}

/** One line that says what a value means here, under 25 words; empty where there is nothing to say. */
export function settingMeaning(
  key: string,
  value: number,
  facts: StandFacts,
  units: UnitSystem,
): string {
  return SETTING_MEANINGS[key]?.(value, units, facts) ?? '';
}
