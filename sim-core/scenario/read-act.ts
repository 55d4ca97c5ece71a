import {MOST_PARTS, neededParts, paceOf} from '../plant/stiffness';
import {type Act} from '../run/log';
import {lineFaults} from './cross-rules';
import {type Fault, ScenarioError} from './faults';
import {DISTURB_FIELDS, LINE_FIELDS, SET_FIELDS} from './fields';
import {isObject, join, readKeys, tableOf} from './read-field';
import {type Disturbance, type LineCommand, type LiveSettings, type Scenario} from './scenario';

const SET_TABLE = tableOf(SET_FIELDS.map(optional));
const LINE_TABLE = tableOf(
  LINE_FIELDS.map((field) => (field.onlyCommand === undefined ? field : optional(field))),
);
const DISTURB_TABLE = tableOf(DISTURB_FIELDS);

/** Checks one change of settings by itself: unknown keys, wrong types, values out of range. */
export function readSet(json: unknown): LiveSettings {
  return checked(json, setFaults('set', json)) as LiveSettings;
}

/** Checks one line command. */
export function readLine(json: unknown): LineCommand {
  return checked(json, commandFaults('line', json)) as LineCommand;
}

/** Checks one disturbance against the plant it would disturb. */
export function readDisturb(json: unknown, scenario: Scenario): Disturbance {
  return checked(json, disturbFaults('disturb', json, scenario)) as Disturbance;
}

/**
 * Checks an act as it arrives from outside. Rules between settings (lowest output below the highest) need
 * the settings in force: those are checked by `Run.act` and by `replay`.
 */
export function readAct(json: unknown, scenario: Scenario): Act {
  return checked(json, actFaults('', json, scenario)) as Act;
}

export function actFaults(at: string, json: unknown, scenario: Scenario): Fault[] {
  const keys = isObject(json) ? Object.keys(json) : [];
  const [key] = keys;
  if (!isObject(json) || keys.length !== 1 || key === undefined)
    return [{path: at, value: json, allowed: 'one of set, line, disturb'}];
  if (key === 'set') return setFaults(join(at, key), json[key]);
  if (key === 'line') return commandFaults(join(at, key), json[key]);
  if (key === 'disturb') return disturbFaults(join(at, key), json[key], scenario);
  return [{path: join(at, key), value: json[key], allowed: 'one of set, line, disturb'}];
}

export function setFaults(at: string, json: unknown): Fault[] {
  if (!isObject(json) || Object.keys(json).length === 0)
    return [{path: at, value: json, allowed: 'an object with at least one controller key'}];
  return readKeys(at, json, SET_TABLE, {nullTakesOff: true});
}

export function commandFaults(
  at: string,
  json: unknown,
  alsoKnown: readonly string[] = [],
): Fault[] {
  if (!isObject(json)) return [{path: at, value: json, allowed: 'an object'}];
  return [
    ...readKeys(at, json, LINE_TABLE, {nullTakesOff: false, alsoKnown}),
    ...lineFaults(at, json),
  ];
}

export function disturbFaults(at: string, json: unknown, scenario: Scenario): Fault[] {
  if (!isObject(json) || Object.keys(json).length === 0)
    return [{path: at, value: json, allowed: 'an object with at least one key of a disturbance'}];
  const faults = readKeys(at, json, DISTURB_TABLE, {nullTakesOff: true});
  for (const {path, onlyWith} of DISTURB_FIELDS)
    if (onlyWith !== undefined && onlyWith !== scenario.sensing.kind && json[path] !== undefined)
      faults.push({path: join(at, path), value: json[path], allowed: 'only with a load cell'});
  if (faults.length > 0) return faults;

  const {radiusM, modulusPa} = json as Disturbance;
  const {coreRadiusM} = scenario.roll;
  if (radiusM !== undefined && radiusM < coreRadiusM)
    faults.push({
      path: join(at, 'radiusM'),
      value: radiusM,
      allowed: `roll.coreRadiusM (${coreRadiusM} m) or more`,
    });
  const largestM = Math.max(radiusM ?? 0, scenario.roll.radiusM);
  return [
    ...faults,
    ...stiffnessFaults(at, scenario, modulusPa ?? scenario.web.modulusPa, largestM),
  ];
}

/** Refuses a plant too stiff to be stepped finely enough. */
export function stiffnessFaults(
  at: string,
  scenario: Scenario,
  modulusPa: number,
  largestRadiusM: number,
): Fault[] {
  const plantStepS = scenario.plantStepS ?? 0.001;
  const pace = paceOf(scenario, modulusPa, largestRadiusM);
  if (neededParts(plantStepS, pace) <= MOST_PARTS) return [];
  const atStart = paceOf(scenario, modulusPa, scenario.roll.radiusM);
  const isByRadius = neededParts(plantStepS, atStart) <= MOST_PARTS;
  const [key, value] = isByRadius ? ['radiusM', largestRadiusM] : ['modulusPa', modulusPa];
  return [
    {
      path: at === '' ? 'plantStepS' : join(at, key),
      value: at === '' ? plantStepS : value,
      allowed: `a plant slower than ${Math.floor(MOST_PARTS / plantStepS)} 1/s (its fastest rate is ${Math.round(pace.rate)} 1/s): a softer or longer web, a heavier roll or dancer, or a shorter plantStepS`,
    },
  ];
}

function optional<F extends {readonly required: boolean}>(field: F): F {
  return {...field, required: false};
}

function checked(json: unknown, faults: readonly Fault[]): unknown {
  if (faults.length > 0) throw new ScenarioError(faults);
  return json;
}
