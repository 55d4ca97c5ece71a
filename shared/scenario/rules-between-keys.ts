import {type LiveSettings, type Scenario, type ScenarioAction} from '#sim-core/index';
import {DISTURB_FIELDS, FIELDS} from '#sim-core/scenario/fields';

/** One rule broken: where in the document, and what it asks. */
export interface BrokenRule {
  readonly path: readonly (string | number)[];
  readonly message: string;
}

/** Part of a tick within which a time counts as reached [s]; the engine's grace. */
const GRACE_S = 1e-9;

type Values = Readonly<Record<string, unknown>>;

/**
 * Rules between keys of a document whose keys are right each by itself. The engine has the same rules in its own
 * words; the property test of scenario.spec.ts holds the two together.
 */
export function rulesBetweenKeys(scenario: Scenario): BrokenRule[] {
  const plantStepS = numberOr(scenario.plantStepS, 'plantStepS');
  const controller = scenario.controller as unknown as Values;
  return [
    ...plantRules(scenario, plantStepS),
    ...settingsRules(['controller'], controller, plantStepS),
    ...diameterRule(controller),
    ...actionRules(scenario, plantStepS),
  ];
}

function plantRules(scenario: Scenario, plantStepS: number): BrokenRule[] {
  const {roll, brake, sensing, controller} = scenario;
  const broken: BrokenRule[] = [];
  const refuse = (path: string, message: string): void => {
    broken.push({path: path.split('.'), message});
  };
  const steps = numberOr(controller.sampleS, 'controller.sampleS') / plantStepS;
  if (Math.abs(steps - Math.round(steps)) >= GRACE_S * steps)
    refuse('plantStepS', 'Must be a whole part of the sample period.');
  if (roll.radiusM < roll.coreRadiusM) refuse('roll.radiusM', 'Must not be below the core’s.');
  if ((brake.residualTorqueNm ?? 0) >= brake.maxTorqueNm)
    refuse('brake.residualTorqueNm', 'Must be below maxTorqueNm.');
  for (const key of ['lagS', 'lagUpS', 'lagDownS'] as const)
    if (isShort(brake[key] ?? 0, plantStepS)) refuse(`brake.${key}`, TOO_SHORT);
  if (sensing.kind === 'loadCell' && isShort(sensing.filterS, plantStepS))
    refuse('sensing.filterS', TOO_SHORT);
  return broken;
}

/** Shortest integral time [s], the engine's. */
const LEAST_TI_S = 1e-4;

const TOO_SHORT = 'Must be 0 or at least two plant steps.';

function isShort(timeS: number, plantStepS: number): boolean {
  return timeS > 0 && timeS < 2 * plantStepS * (1 - 1e-12);
}

/** Rules between settings, in the document and after each `set`. */
function settingsRules(
  at: readonly (string | number)[],
  settings: Values,
  plantStepS: number,
): BrokenRule[] {
  const broken: BrokenRule[] = [];
  const refuse = (key: keyof LiveSettings, message: string): void => {
    broken.push({path: [...at, key], message});
  };
  const value = (key: keyof LiveSettings): unknown =>
    settings[key] ?? defaultOf(`controller.${key}`);
  if ((value('outMinPct') as number) >= (value('outMaxPct') as number))
    refuse('outMaxPct', 'Must be above outMinPct.');
  if (value('radiusCompensation') === true && value('radiusRefM') === null)
    refuse('radiusRefM', 'Needed, as radiusCompensation is on.');
  if (value('antiWindup') === 'backCalculation' && value('trackingS') === null)
    refuse('trackingS', 'Needed, as antiWindup is backCalculation.');
  if (isShort(value('inputFilterS') as number, plantStepS)) refuse('inputFilterS', TOO_SHORT);
  const tiS = value('tiS') as number;
  if (tiS > 0 && tiS < LEAST_TI_S) refuse('tiS', 'Must be 0 or at least 0.1 ms.');
  const trackingS = value('trackingS') as number | null;
  if (trackingS !== null && trackingS < (value('sampleS' as keyof LiveSettings) as number) / 2)
    refuse('trackingS', 'Must be at least half the sample period.');
  return broken;
}

/** Only the document must say where a counted diameter begins: a `set` goes on from the present one. */
function diameterRule(controller: Values): BrokenRule[] {
  const source = controller['radiusSource'] ?? 'true';
  if (source === 'true' || controller['radiusEnteredM'] !== undefined) return [];
  const message = 'Needed, as radiusSource is not "true".';
  return [{path: ['controller', 'radiusEnteredM'], message}];
}

/** Each `set` must agree with the settings it meets, in the order in which the actions act. */
function actionRules(scenario: Scenario, plantStepS: number): BrokenRule[] {
  const sampleS = numberOr(scenario.controller.sampleS, 'controller.sampleS');
  const inOrder = scenario.actions
    .map((action, place) => ({action, place, tick: tickOf(action.atS, sampleS)}))
    .sort((a, b) => a.tick - b.tick || a.place - b.place);
  let settings = scenario.controller as unknown as Values;
  return inOrder.flatMap(({action, place}) => {
    if (!('set' in action)) return disturbRules(['actions', place, 'disturb'], action, scenario);
    settings = {...settings, ...action.set};
    return settingsRules(['actions', place, 'set'], settings, plantStepS);
  });
}

function disturbRules(
  at: readonly (string | number)[],
  {disturb}: Extract<ScenarioAction, {readonly disturb: unknown}>,
  {roll, sensing}: Scenario,
): BrokenRule[] {
  const broken: BrokenRule[] = [];
  for (const {path: key, onlyWith = sensing.kind} of DISTURB_FIELDS)
    if (key in disturb && onlyWith !== sensing.kind)
      broken.push({path: [...at, key], message: 'Only with a load cell.'});
  if (disturb.radiusM !== undefined && disturb.radiusM < roll.coreRadiusM)
    broken.push({path: [...at, 'radiusM'], message: 'Must not be below the core’s.'});
  return broken;
}

/** The first tick with t >= atS − 1e-9. */
function tickOf(atS: number, sampleS: number): number {
  let tick = Math.max(0, Math.floor(atS / sampleS) - 1);
  while (tick * sampleS < atS - GRACE_S) tick++;
  return tick;
}

function defaultOf(path: string): unknown {
  return FIELDS.find((field) => field.path === path)?.default ?? null;
}

function numberOr(value: number | undefined, path: string): number {
  return value ?? (defaultOf(path) as number);
}
