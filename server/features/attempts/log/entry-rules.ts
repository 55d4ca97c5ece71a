import {type Fault, readLine, readSet, ScenarioError} from '#sim-core/index';
import {type Entry} from '#shared/attempts/attempt';
import {type Exercise, type Touch} from '#shared/exercises/exercise';

type Setting = Touch['settings'][number];
type Command = Touch['commands'][number];

/** What in this entry the exercise does not allow; paths below the entry. Stamps are judged by `stampFaults`. */
export function entryFaults(entry: Entry, exercise: Exercise): Fault[] {
  switch (entry.kind) {
    case 'set':
      return setFaults(entry.set, exercise.touch);
    case 'line':
      return lineFaults(entry.line, exercise.touch);
    case 'disturb':
      return refused(entry, 'no upsets in an exercise');
    case 'pause':
    case 'resume':
      return exercise.time.pause === 'none' ? refused(entry, 'no pause in this exercise') : [];
    case 'factor': {
      const {factors} = exercise.time;
      if (factors.includes(entry.factor)) return [];
      return [{path: 'factor', value: entry.factor, allowed: factors.join(', ')}];
    }
    case 'hint':
      return countedFaults('hint', entry.hint, exercise.hints.length);
    case 'answer':
      return countedFaults('question', entry.question, 0); // no exercise asks questions yet
    case 'namedFault':
      return refused(entry, 'no naming of faults in this exercise');
    case 'end':
      return [];
  }
}

function refused({kind}: Entry, allowed: string): Fault[] {
  return [{path: 'kind', value: kind, allowed}];
}

/** `value` counts from 0. */
function countedFaults(path: string, value: number, count: number): Fault[] {
  if (value < count) return [];
  return [{path, value, allowed: count === 0 ? 'there is none' : `0 … ${count - 1}`}];
}

function setFaults(set: Readonly<Record<string, unknown>>, {settings}: Touch): Fault[] {
  const locked = Object.entries(set).filter(([key]) => !settings.some((each) => each.key === key));
  if (locked.length > 0) {
    const open = settings.map(({key}) => key).join(', ');
    const allowed = `${open === '' ? 'no setting' : `only ${open}`}; this one is locked`;
    return locked.map(([key, value]) => ({path: `set.${key}`, value, allowed}));
  }
  const own = faultsOf(() => readSet(set));
  if (own.length > 0) return own;
  return settings.flatMap((setting) => {
    const value = set[setting.key];
    if (value === undefined || fits(setting, value)) return [];
    return [{path: `set.${setting.key}`, value, allowed: describeSetting(setting)}];
  });
}

/** Choices, when named, are all there is; a range takes numbers alone. */
function fits({lowest, highest, choices}: Setting, value: unknown): boolean {
  if (choices) return (choices as readonly unknown[]).includes(value);
  if (lowest === undefined && highest === undefined) return true;
  if (typeof value !== 'number') return false;
  return isWithin(value, [lowest ?? -Infinity, highest ?? Infinity]);
}

function describeSetting({lowest, highest, choices}: Setting): string {
  return choices?.join(', ') ?? `${lowest ?? ''} … ${highest ?? ''}`.trim();
}

function lineFaults(json: Readonly<Record<string, unknown>>, {commands}: Touch): Fault[] {
  const faults = faultsOf(() => readLine(json));
  if (faults.length > 0) return faults;
  const line = readLine(json);
  const own = commands.filter(({command}) => command === line.command);
  if (own.length === 0) {
    const allowed = [...new Set(commands.map(({command}) => command))].join(', ');
    return [{path: 'line.command', value: line.command, allowed: allowed || 'no command'}];
  }
  const isAllowed = own.some(
    ({speedMps, rampS}) =>
      isWithin(line.rampS, rampS) &&
      (line.command !== 'run' || speedMps === undefined || isWithin(line.speedMps, speedMps)),
  );
  if (isAllowed) return [];
  return [{path: 'line', value: json, allowed: own.map(describeCommand).join(', or ')}];
}

function describeCommand({command, speedMps, rampS}: Command): string {
  const speed = speedMps ? `speedMps ${range(speedMps)}, ` : '';
  return `${command} with ${speed}rampS ${range(rampS)}`;
}

function range([lowest, highest]: readonly [number, number]): string {
  return lowest === highest ? `${lowest}` : `${lowest} … ${highest}`;
}

function isWithin(value: number, [lowest, highest]: readonly [number, number]): boolean {
  return value >= lowest && value <= highest;
}

function faultsOf(read: () => unknown): readonly Fault[] & Fault[] {
  try {
    read();
    return [];
  } catch (error) {
    if (error instanceof ScenarioError) return [...error.faults]; // what the engine would refuse
    throw error;
  }
}
