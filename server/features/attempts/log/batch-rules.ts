import {type Fault, settingsOf, tickOf} from '#sim-core/index';
import {type Batch, type Entry} from '#shared/attempts/attempt';
import {type Exercise} from '#shared/exercises/exercise';
import {AppError} from '../../../errors';
import {entryFaults} from './entry-rules';

/** Fastest that a run is simulated for a person: times real time, and what may be ahead of it [s]. */
const FASTEST = 20;
const AHEAD_S = 5;
/** Faults told of one batch. */
const MOST_FAULTS = 20;
/** Longer values come back cut, so that a refusal is never larger than what was refused. */
const LONGEST_VALUE = 200;

/** Where the log stands before a batch. */
export interface Standing {
  readonly lastEntry: number;
  readonly lastEntryTick: number;
  /** Since the attempt began [s], by our clock. */
  readonly elapsedS: number;
}

type Content = Pick<Batch, 'throughTick' | 'entries'>;

/** Refuses the whole batch when one entry is not allowed, with the place and the reason of each. */
export function checkBatch(batch: Content, exercise: Exercise, standing: Standing): void {
  const faults = [
    ...throughFaults(batch.throughTick, exercise),
    ...batch.entries.flatMap((entry, index) =>
      [
        ...stampFaults(entry, index, batch, exercise, standing),
        ...entryFaults(entry, exercise),
      ].map((fault) => ({...fault, path: `entries.${index}.${fault.path}`})),
    ),
  ];
  if (faults.length > 0) throw refusal(faults);
  checkPace(batch.throughTick, exercise, standing.elapsedS);
}

/** Refuses a beat beyond the limits. */
export function checkBeat(throughTick: number, exercise: Exercise, elapsedS: number): void {
  const faults = throughFaults(throughTick, exercise);
  if (faults.length > 0) throw refusal(faults);
  checkPace(throughTick, exercise, elapsedS);
}

function throughFaults(throughTick: number, exercise: Exercise): Fault[] {
  const limit = limitTick(exercise);
  if (throughTick <= limit) return [];
  return [{path: 'throughTick', value: throughTick, allowed: `at most ${limit}`}];
}

/** Faults of n, of the tick, and of what stands where it may not. */
function stampFaults(
  entry: Entry,
  index: number,
  {entries, throughTick}: Content,
  exercise: Exercise,
  {lastEntry, lastEntryTick}: Standing,
): Fault[] {
  const faults: Fault[] = [];
  const wanted = lastEntry + 1 + index;
  if (entry.n !== wanted) faults.push({path: 'n', value: entry.n, allowed: `${wanted}`});

  const before = entries[index - 1]?.tick ?? Math.max(lastEntryTick, handOverTick(exercise));
  const last = Math.min(throughTick, limitTick(exercise));
  if (entry.tick < before || entry.tick > last)
    faults.push({path: 'tick', value: entry.tick, allowed: `${before} … ${last}`});

  // Handing in must stay possible when the log is full.
  const {entries: most} = exercise.limits;
  if (entry.n > most && entry.kind !== 'end')
    faults.push({path: 'n', value: entry.n, allowed: `at most ${most} entries, then the end`});
  if (entry.kind === 'end' && index < entries.length - 1)
    faults.push({path: 'kind', value: 'end', allowed: 'only as the last entry'});
  return faults;
}

/** Ticks come no faster than a person can let them run; the engine runs to the hand-over by itself. */
function checkPace(throughTick: number, exercise: Exercise, elapsedS: number): void {
  const {sampleS} = settingsOf(exercise.scenario.controller);
  const mostS = FASTEST * elapsedS + AHEAD_S;
  const mostTick = handOverTick(exercise) + Math.floor(mostS / sampleS);
  if (throughTick <= mostTick) return;
  throw new AppError('too-fast', {
    detail: `So soon after the start the run cannot be beyond tick ${mostTick}.`,
    errors: [
      {path: 'body.throughTick', message: `Allowed: at most ${mostTick}`, value: throughTick},
    ],
  });
}

function limitTick({limits, scenario}: Exercise): number {
  return tickOf(limits.simulatedS, settingsOf(scenario.controller).sampleS);
}

function handOverTick({handOverS, scenario}: Exercise): number {
  return tickOf(handOverS, settingsOf(scenario.controller).sampleS);
}

function refusal(faults: readonly Fault[]): AppError {
  return new AppError('entry-refused', {
    detail: 'Nothing of this batch was stored: not all of it is allowed; see errors.',
    errors: faults.slice(0, MOST_FAULTS).map(({path, value, allowed}) => ({
      path: `body.${path}`,
      message: `Allowed: ${allowed}`,
      ...(value !== undefined && {value: shorten(value)}),
    })),
  });
}

function shorten(value: unknown): unknown {
  const text = JSON.stringify(value);
  return text.length <= LONGEST_VALUE ? value : `${text.slice(0, LONGEST_VALUE)}…`;
}
