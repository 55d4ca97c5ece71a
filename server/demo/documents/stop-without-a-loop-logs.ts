import {type LiveSettings, type LogEntry, replay} from '#sim-core/index';
import {STOP_WITHOUT_A_LOOP} from './stop-without-a-loop';

/** Ticks of 10 ms: the line has been at speed for 17 s when it is stopped, and starts again 15 s later. */
const STOP_TICK = 2500;
const RESTART_TICK = 4000;
const END_TICK = 5400;

/** A log as a trainee leaves it, its `end` with the right hash. */
export interface WrittenLog {
  readonly entries: readonly LogEntry[];
  readonly throughTick: number;
}

/** Start, stop, start again, hand in; with settings changed while the line runs. */
export function stopAndStartAgain(
  set: LiveSettings | null,
  restartTick = RESTART_TICK,
): WrittenLog {
  const acts: LogEntry[] = [];
  const add = (tick: number, rest: object): void => {
    acts.push({n: acts.length + 1, tick, ...rest} as LogEntry);
  };
  add(0, {kind: 'line', line: {command: 'run', speedMps: 2, rampS: 7}});
  if (set !== null) add(1200, {kind: 'set', set});
  add(STOP_TICK, {kind: 'line', line: {command: 'stop', rampS: 3}});
  add(restartTick, {kind: 'line', line: {command: 'run', speedMps: 2, rampS: 7}});
  const {scenario} = STOP_WITHOUT_A_LOOP;
  const throughTick = restartTick + END_TICK - RESTART_TICK;
  const hash = replay(scenario, acts, throughTick).hash();
  add(throughTick, {kind: 'end', hash});
  return {entries: acts, throughTick};
}

/** Passes with full marks: enough boost, over before the next start. */
export const passingLog = (): WrittenLog => stopAndStartAgain({stopHoldGain: 1.4, stopHoldS: 5});
/** Nothing changed: the start that must fail. */
export const untouchedLog = (): WrittenLog => stopAndStartAgain(null);
/** Usual mistake: the boost doubled, "to be safe". */
export const doubledBoostLog = (): WrittenLog =>
  stopAndStartAgain({stopHoldGain: 1.8, stopHoldS: 6});
/** Usual mistake: the boost still on when the line starts again. */
export const lateBoostLog = (): WrittenLog => stopAndStartAgain({stopHoldGain: 1.4, stopHoldS: 18});
/** Usual mistake: the boost gone before the line stands. */
export const shortBoostLog = (): WrittenLog =>
  stopAndStartAgain({stopHoldGain: 1.4, stopHoldS: 2.5});
/** Passes, with marks lost on the least tension. */
export const carefulBoostLog = (): WrittenLog =>
  stopAndStartAgain({stopHoldGain: 1.3, stopHoldS: 5});
