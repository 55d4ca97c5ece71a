import {type Fault, ScenarioError} from '../scenario/faults';
import {isObject} from '../scenario/read-field';
import {readScenario} from '../scenario/read-scenario';
import {type Scenario, type ScenarioAction} from '../scenario/scenario';
import {settingsOf} from '../scenario/settings';
import {type Act, type LogEntry} from './log';
import {type Run} from './run';
import {Simulation} from './simulation';
import {type TraceBlock} from './trace';

/** Starts a run of a document from outside. Throws ScenarioError with every fault of it. */
export function startRun(document: unknown): Run {
  return new Simulation(readScenario(document));
}

/**
 * Runs a document with a log through `throughTick` ticks. The answer can go on: further entries count on
 * from the last. Throws ScenarioError for a gap in n, a falling tick, an entry beyond the end or a value
 * that the live run would have refused. Rows go into `block` when given.
 */
export function replay(
  document: unknown,
  entries: readonly LogEntry[],
  throughTick: number,
  block?: TraceBlock,
): Run {
  const scenario = readScenario(document);
  const faults = stampFaults(entries, throughTick);
  if (faults.length > 0) throw new ScenarioError(faults);

  if (block !== undefined && block.capacity - block.count < throughTick)
    throw new RangeError(`The block has no room for ${throughTick} rows.`);

  const run = new Simulation(scenario);
  entries.forEach((entry, place) => {
    run.advance(entry.tick - run.tick, block);
    const act = actOf(entry);
    if (act !== null) run.take(act, `entries[${place}]`);
    run.stamp();
  });
  run.advance(throughTick - run.tick, block);
  return run;
}

/** One document that runs to the same hash as `document` with this log. */
export function asScenario(document: unknown, entries: readonly LogEntry[]): Scenario {
  const scenario = readScenario(document);
  const {sampleS} = settingsOf(scenario.controller);
  const line = [...scenario.line];
  const actions: ScenarioAction[] = [...scenario.actions];
  for (const entry of entries) {
    const atS = entry.tick * sampleS;
    if (entry.kind === 'line') line.push({atS, ...entry.line});
    else if (entry.kind === 'set') actions.push({atS, set: entry.set});
    else if (entry.kind === 'disturb') actions.push({atS, disturb: entry.disturb});
  }
  return readScenario({...scenario, line, actions});
}

const NOTES: readonly string[] = [
  'pause',
  'resume',
  'factor',
  'hint',
  'answer',
  'namedFault',
  'end',
];

function stampFaults(entries: readonly unknown[], throughTick: number): Fault[] {
  const faults: Fault[] = [];
  if (!isTick(throughTick))
    faults.push({path: 'throughTick', value: throughTick, allowed: 'a whole number, 0 or more'});
  let last = 0;
  entries.forEach((entry, place) => {
    const at = `entries[${place}]`;
    if (!isObject(entry)) {
      faults.push({path: at, value: entry, allowed: 'an object'});
      return;
    }
    const {n, tick, kind} = entry;
    if (n !== place + 1) faults.push({path: `${at}.n`, value: n, allowed: `${place + 1}`});
    if (!isTick(tick) || tick < last || tick > throughTick)
      faults.push({path: `${at}.tick`, value: tick, allowed: `${last} … ${throughTick}`});
    else last = tick;
    const isKnown = kind === 'set' || kind === 'line' || kind === 'disturb';
    if (!isKnown && !NOTES.includes(kind as string))
      faults.push({path: `${at}.kind`, value: kind, allowed: 'a kind of log entry'});
  });
  return faults;
}

function isTick(value: unknown): value is number {
  return typeof value === 'number' && value >= 0 && value % 1 === 0;
}

/** What the engine does for an entry; null for one it does not feel. */
function actOf(entry: LogEntry): Act | null {
  switch (entry.kind) {
    case 'set':
      return {set: entry.set};
    case 'line':
      return {line: entry.line};
    case 'disturb':
      return {disturb: entry.disturb};
    default:
      return null;
  }
}
