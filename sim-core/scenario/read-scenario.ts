import {GRACE_S, plantFaults, settingsFaults} from './cross-rules';
import {type Fault, ScenarioError} from './faults';
import {AT_FIELD, type Field, FIELDS, MOST_ENTRIES} from './fields';
import {commandFaults, disturbFaults, setFaults, stiffnessFaults} from './read-act';
import {
  allowedIn,
  type FieldTable,
  fits,
  isObject,
  join,
  type JsonObject,
  keyOf,
  readKeys,
  tableOf,
} from './read-field';
import {type Scenario, SCENARIO_FORMAT, type ScenarioAction} from './scenario';
import {changed, settingsOf} from './settings';

const SECTIONS = ['web', 'roll', 'span', 'brake', 'sensing', 'controller'] as const;
const TOP_TABLE = tableOf(FIELDS.filter(({path}) => !path.includes('.')));

/** Tables of a section's keys: by kind of sensing, and for a document that has none. */
const SECTION_TABLES: ReadonlyMap<string, FieldTable> = new Map(
  SECTIONS.flatMap((section) =>
    ['loadCell', 'dancer', 'none'].map((kind) => [
      `${section} ${kind}`,
      tableOf(
        FIELDS.filter(
          ({path, onlyWith = kind}) => path.startsWith(`${section}.`) && onlyWith === kind,
        ),
      ),
    ]),
  ),
);

/** Checks a document from outside, with every fault at once. The answer is the document itself. */
export function readScenario(json: unknown): Scenario {
  const faults = scenarioFaults(json);
  if (faults.length > 0) throw new ScenarioError(faults);
  return json as Scenario;
}

/** Everything wrong in a document; rules between keys are tried only when the keys themselves are right. */
export function scenarioFaults(json: unknown): Fault[] {
  if (!isObject(json)) return [{path: '', value: json, allowed: 'a JSON object'}];
  const faults = shapeFaults(json);
  if (faults.length > 0) return faults;
  const scenario = json as unknown as Scenario;
  const settings = settingsOf(scenario.controller);
  const plantStepS = scenario.plantStepS ?? 0.001;
  return [
    ...plantFaults(scenario, settings.sampleS, plantStepS),
    ...settingsFaults('controller', settings, plantStepS),
    ...stiffnessFaults('', scenario, scenario.web.modulusPa, scenario.roll.radiusM),
    ...actionFaults(scenario, settings.sampleS, plantStepS),
  ];
}

/** The document with every default written out. */
export function withDefaults(scenario: Scenario): Scenario {
  const whole = structuredCopy(scenario) as Record<string, unknown>;
  for (const field of FIELDS) {
    if (field.default === null || !belongs(field, scenario)) continue;
    const dot = field.path.indexOf('.');
    const into = dot < 0 ? whole : (whole[field.path.slice(0, dot)] as Record<string, unknown>);
    into[keyOf(field)] ??= field.default;
  }
  return whole as unknown as Scenario;
}

function shapeFaults(json: JsonObject): Fault[] {
  const faults = readKeys('', json, TOP_TABLE, {
    nullTakesOff: false,
    alsoKnown: ['format', 'line', 'actions', ...SECTIONS],
  });
  if (json['format'] !== SCENARIO_FORMAT)
    faults.unshift({path: 'format', value: json['format'], allowed: SCENARIO_FORMAT});
  for (const section of SECTIONS) faults.push(...sectionFaults(section, json[section], json));
  faults.push(...listFaults('line', json['line'], (at, item) => lineItemFaults(at, item)));
  faults.push(...listFaults('actions', json['actions'], (at, item) => setItemFaults(at, item)));
  return faults;
}

function sectionFaults(section: string, value: unknown, json: JsonObject): Fault[] {
  if (!isObject(value)) return [{path: section, value, allowed: 'an object'}];
  const kind = isObject(json['sensing']) ? json['sensing']['kind'] : null;
  const known = kind === 'loadCell' || kind === 'dancer' ? kind : 'none';
  return readKeys(section, value, SECTION_TABLES.get(`${section} ${known}`)!, {
    nullTakesOff: false,
  });
}

/** Whether a field is one of this document's kind of sensing. */
function belongs({onlyWith}: Field, json: {readonly sensing?: unknown}): boolean {
  if (onlyWith === undefined) return true;
  return isObject(json.sensing) && json.sensing['kind'] === onlyWith;
}

function listFaults(
  at: string,
  list: unknown,
  itemFaults: (at: string, item: JsonObject) => Fault[],
): Fault[] {
  if (!Array.isArray(list) || list.length > MOST_ENTRIES)
    return [{path: at, value: list, allowed: `a list of at most ${MOST_ENTRIES} entries`}];
  return list.flatMap((item: unknown, place) => {
    const path = `${at}[${place}]`;
    return isObject(item) ? itemFaults(path, item) : [{path, value: item, allowed: 'an object'}];
  });
}

function lineItemFaults(at: string, item: JsonObject): Fault[] {
  return [...timeFaults(at, item), ...commandFaults(at, item, ['atS'])];
}

function setItemFaults(at: string, item: JsonObject): Fault[] {
  const faults = timeFaults(at, item);
  for (const key of Object.keys(item))
    if (key !== 'atS' && key !== 'set' && key !== 'disturb')
      faults.push({path: join(at, key), value: item[key], allowed: 'no such key'});
  const isSet = Object.hasOwn(item, 'set');
  if (isSet === Object.hasOwn(item, 'disturb'))
    faults.push({path: at, value: item, allowed: 'one of set, disturb'});
  else if (isSet) faults.push(...setFaults(join(at, 'set'), item['set']));
  else if (!isObject(item['disturb']))
    faults.push({path: join(at, 'disturb'), value: item['disturb'], allowed: 'an object'});
  return faults;
}

function timeFaults(at: string, item: JsonObject): Fault[] {
  if (fits(AT_FIELD, item['atS'])) return [];
  return [{path: join(at, 'atS'), value: item['atS'], allowed: allowedIn(AT_FIELD)}];
}

/** Follows the actions in the order they act: each `set` must agree with the settings it meets. */
function actionFaults(scenario: Scenario, sampleS: number, plantStepS: number): Fault[] {
  const faults: Fault[] = [];
  let settings = settingsOf(scenario.controller);
  let modulusPa = scenario.web.modulusPa;
  let largestM = scenario.roll.radiusM;
  for (const {action, place} of inOrder(scenario.actions, sampleS)) {
    const at = `actions[${place}]`;
    if ('set' in action) {
      settings = changed(settings, action.set);
      faults.push(...settingsFaults(`${at}.set`, settings, plantStepS));
      continue;
    }
    const own = disturbFaults(`${at}.disturb`, action.disturb, scenario);
    faults.push(...own);
    if (own.length > 0) continue;
    modulusPa = action.disturb.modulusPa ?? modulusPa;
    largestM = Math.max(largestM, action.disturb.radiusM ?? 0);
    faults.push(...stiffnessFaults(`${at}.disturb`, scenario, modulusPa, largestM));
  }
  return faults;
}

/** Actions by the tick they act in; those of one tick in document order. */
function inOrder(
  actions: readonly ScenarioAction[],
  sampleS: number,
): {readonly action: ScenarioAction; readonly place: number}[] {
  return actions
    .map((action, place) => ({action, place, tick: tickOf(action.atS, sampleS)}))
    .sort((a, b) => a.tick - b.tick || a.place - b.place);
}

/** The first tick with t >= atS − 1e-9. */
export function tickOf(atS: number, sampleS: number): number {
  let tick = Math.max(0, Math.floor(atS / sampleS) - 1);
  while (tick * sampleS < atS - GRACE_S) tick++;
  return tick;
}

function structuredCopy(value: object): unknown {
  return JSON.parse(JSON.stringify(value));
}
