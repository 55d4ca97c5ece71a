import {type Fault} from './faults';
import {join} from './read-field';
import {type LineCommand, type Scenario} from './scenario';
import {type Settings} from './settings';

/** Part of a tick within which a time counts as reached [s]. */
export const GRACE_S = 1e-9;

/** Shortest integral time [s]; 0 switches the integral part off. */
const LEAST_TI_S = 1e-4;

/** Rules between keys of the controller; `at` is where the settings came from. */
export function settingsFaults(at: string, settings: Settings, plantStepS: number): Fault[] {
  const faults: Fault[] = [];
  const refuse = (key: keyof Settings, allowed: string): void => {
    faults.push({path: join(at, key), value: settings[key] ?? undefined, allowed});
  };
  if (settings.outMinPct >= settings.outMaxPct) refuse('outMaxPct', 'more than outMinPct');
  if (settings.radiusCompensation && settings.radiusRefM === null)
    refuse('radiusRefM', 'a radius, as radiusCompensation is on');
  if (settings.antiWindup === 'backCalculation' && settings.trackingS === null)
    refuse('trackingS', 'a time, as antiWindup is backCalculation');
  if (isShort(settings.inputFilterS, plantStepS)) refuse('inputFilterS', noShorter(plantStepS));
  if (settings.tiS > 0 && settings.tiS < LEAST_TI_S)
    refuse('tiS', `0, or at least ${LEAST_TI_S} s`);
  const leastS = settings.sampleS / 2;
  if (settings.trackingS !== null && settings.trackingS < leastS)
    refuse('trackingS', `at least half the sample period (${leastS} s): less makes it swing up`);
  return faults;
}

/** Rules between keys of the plant. */
export function plantFaults(scenario: Scenario, sampleS: number, plantStepS: number): Fault[] {
  const faults: Fault[] = [];
  const refuse = (path: string, value: unknown, allowed: string): void => {
    faults.push({path, value, allowed});
  };
  const {roll, brake, sensing, controller} = scenario;
  if (!divides(plantStepS, sampleS))
    refuse('plantStepS', plantStepS, `a whole part of controller.sampleS (${sampleS} s)`);
  if (roll.radiusM < roll.coreRadiusM)
    refuse('roll.radiusM', roll.radiusM, `roll.coreRadiusM (${roll.coreRadiusM} m) or more`);
  if ((brake.residualTorqueNm ?? 0) >= brake.maxTorqueNm)
    refuse('brake.residualTorqueNm', brake.residualTorqueNm, 'less than brake.maxTorqueNm');
  for (const key of ['lagS', 'lagUpS', 'lagDownS'] as const)
    if (isShort(brake[key] ?? 0, plantStepS))
      refuse(`brake.${key}`, brake[key], noShorter(plantStepS));
  if (sensing.kind === 'loadCell' && isShort(sensing.filterS, plantStepS))
    refuse('sensing.filterS', sensing.filterS, noShorter(plantStepS));
  const source = controller.radiusSource ?? 'true';
  if (source !== 'true' && (controller.radiusEnteredM ?? null) === null)
    refuse('controller.radiusEnteredM', undefined, `a radius, as radiusSource is ${source}`);
  return faults;
}

/** `speedMps` belongs to `run` and to nothing else. */
export function lineFaults(at: string, line: Partial<LineCommand>): Fault[] {
  const speed = (line as {readonly speedMps?: unknown}).speedMps;
  if (line.command === 'run' && speed === undefined)
    return [
      {path: join(at, 'speedMps'), value: undefined, allowed: 'a speed, as the command is run'},
    ];
  if ((line.command === 'stop' || line.command === 'fastStop') && speed !== undefined)
    return [{path: join(at, 'speedMps'), value: speed, allowed: 'only with run'}];
  return [];
}

/** Whether `step` fits into `whole` a whole number of times, to within rounding of the decimals. */
function divides(step: number, whole: number): boolean {
  const times = whole / step;
  return Math.abs(times - Math.round(times)) < 1e-9 * times && Math.round(times) >= 1;
}

function isShort(timeS: number, plantStepS: number): boolean {
  return timeS > 0 && timeS < 2 * plantStepS * (1 - 1e-12);
}

function noShorter(plantStepS: number): string {
  return `0 or at least two plant steps (${2 * plantStepS} s)`;
}
