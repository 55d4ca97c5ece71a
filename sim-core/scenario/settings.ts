import {CONTROLLER_KEYS, FIELDS} from './fields';
import {type ControllerParams, type LiveSettings} from './scenario';

/** Points of a curve. */
export type Points = readonly (readonly [number, number])[];

/** Every controller key with its value in force; null for an optional one that is off. */
export interface Settings {
  readonly sampleS: number;
  readonly kp: number;
  readonly tiS: number;
  readonly tdS: number;
  readonly derivativeN: number;
  readonly setPointWeight: number;
  readonly outMinPct: number;
  readonly outMaxPct: number;
  readonly setPointN: number;
  readonly mode: 'automatic' | 'manual';
  readonly manualPct: number;
  readonly startRampS: number;
  readonly startFraction: number;
  readonly standstillPct: number;
  readonly stopHoldS: number;
  readonly stopHoldGain: number;
  readonly radiusCompensation: boolean;
  readonly radiusRefM: number | null;
  readonly inertiaAssistPct: number;
  readonly setPointRateNps: number;
  readonly startOutputPct: number | null;
  readonly closeAboveN: number;
  readonly startHoldS: number;
  readonly fastStopGain: number | null;
  readonly fastStopHoldS: number | null;
  readonly gainByRadius: Points | null;
  readonly radiusSource: 'true' | 'counted' | 'ratio';
  readonly radiusEnteredM: number | null;
  readonly caliperEnteredM: number;
  readonly zeroAdjustN: number;
  readonly spanAdjustPct: number;
  readonly inputSign: 1 | -1;
  readonly inputFilterS: number;
  readonly antiWindup: 'conditional' | 'backCalculation' | 'none';
  readonly trackingS: number | null;
  readonly bumpless: boolean;
  readonly outRatePctPerS: number;
  readonly outStepPct: number;
}

const DEFAULTS = Object.fromEntries(
  CONTROLLER_KEYS.map((key) => [
    key,
    FIELDS.find(({path}) => path === `controller.${key}`)?.default ?? null,
  ]),
) as unknown as Settings;

/** The settings a checked document starts with. */
export function settingsOf(controller: ControllerParams): Settings {
  const given = controller as unknown as Readonly<Record<string, unknown>>;
  const settings = {...DEFAULTS} as unknown as Record<string, unknown>;
  for (const key of CONTROLLER_KEYS) settings[key] = given[key] ?? settings[key];
  return settings as unknown as Settings;
}

/** The settings after one `set`; null takes a key off. */
export function changed(settings: Settings, set: LiveSettings): Settings {
  return {...settings, ...set};
}
