import {type Case} from './cases';
import {type TimedRun} from './jobs';
import {type Programs} from './programs';
import {type Spread, spreadOf} from './spread';

/** Simulated time that one process runs through [s]; its first half warms up and does not count. */
const SIMULATED_S = 800;
const LEAST_RUNS = 2;

/** How far the end states of the two sides may lie apart, relative. */
const SAME_WORK = 1e-5;

/** Time of one simulated second on both sides, the start of the run included. */
export interface WarmTimes {
  readonly name: string;
  readonly keepsRows: boolean;
  /** Processor time [µs]: programs beside disturb it less than the clock's. */
  readonly engineUs: Spread;
  readonly plainUs: Spread;
  /** Engine over C, of neighbouring processes. */
  readonly ratio: Spread;
  /** The same by the clock: what one waits, when the machine is free. */
  readonly clockRatio: Spread;
}

/** Engine and C in turn, a process each, `rounds` times. `before`: what the engine's process has run before. */
export function warmTimes(
  programs: Programs,
  each: Case,
  {rounds, keep, before = []}: {rounds: number; keep: boolean; before?: readonly Case[]},
): WarmTimes {
  const {durationS, controller} = each.document;
  const runs = Math.max(LEAST_RUNS, Math.ceil(SIMULATED_S / durationS));
  const sampleS = controller.sampleS ?? 0.01;
  const pairs = Array.from({length: rounds}, () => {
    const engine = programs.engineTimes(each, runs, keep, before).runs;
    const plain = programs.plainTimes(each, runs, keep).runs;
    checkSameWork(each.name, engine, plain);
    return {engine: warmOf(engine, sampleS), plain: warmOf(plain, sampleS)};
  });
  return {
    name: before.length > 0 ? `${each.name}, after other stands` : each.name,
    keepsRows: keep,
    engineUs: spreadOf(pairs.map(({engine}) => engine.cpuUs)),
    plainUs: spreadOf(pairs.map(({plain}) => plain.cpuUs)),
    ratio: spreadOf(pairs.map(({engine, plain}) => engine.cpuUs / plain.cpuUs)),
    clockRatio: spreadOf(pairs.map(({engine, plain}) => engine.clockUs / plain.clockUs)),
  };
}

/** Medians over the second half of a process's runs [µs a simulated second]. */
function warmOf(
  runs: readonly TimedRun[],
  sampleS: number,
): {readonly cpuUs: number; readonly clockUs: number} {
  const warm = runs.slice(Math.floor(runs.length / 2));
  const perSecond = (ns: (run: TimedRun) => number): number =>
    spreadOf(warm.map((run) => ns(run) / (1000 * run.ticks * sampleS))).median;
  return {cpuUs: perSecond(({cpuNs}) => cpuNs), clockUs: perSecond(({ns}) => ns)};
}

/** A side that did less would look fast. */
export function checkSameWork(
  name: string,
  engine: readonly TimedRun[],
  plain: readonly TimedRun[],
): void {
  const [first] = plain;
  if (first === undefined) throw new Error(`${name}: the C program ran nothing.`);
  for (const {ticks, sum} of [...engine, ...plain])
    if (ticks !== first.ticks || !(Math.abs(sum / first.sum - 1) < SAME_WORK))
      throw new Error(`${name}: ended at ${ticks}, ${sum} and ${first.ticks}, ${first.sum}.`);
}
