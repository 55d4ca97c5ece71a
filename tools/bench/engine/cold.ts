import {type Case} from './cases';
import {type Programs} from './programs';
import {type Spread, spreadOf} from './spread';
import {checkSameWork} from './warm';

const PROCESSES = 9;

/** First runs in new processes [ms]. */
export interface ColdTimes {
  readonly name: string;
  /** The first run alone, the program loaded. */
  readonly engineRunMs: Spread;
  readonly plainRunMs: Spread;
  readonly runRatio: Spread;
  /** Processor time of that run: compiling beside it counts, waiting for a busy machine does not. */
  readonly engineCpuMs: Spread;
  readonly plainCpuMs: Spread;
  readonly cpuRatio: Spread;
  /** From starting the process to its end. */
  readonly engineProcessMs: Spread;
  readonly plainProcessMs: Spread;
  readonly processRatio: Spread;
}

/** The document runs for `durationS` [s] whatever it says itself. */
export function coldTimes(
  programs: Programs,
  {name, document}: Case,
  durationS: number,
): ColdTimes {
  const shortened: Case = {name: `${name}, ${durationS} s`, document: {...document, durationS}};
  const pairs = Array.from({length: PROCESSES}, () => {
    const engine = programs.engineTimes(shortened, 1, false);
    const plain = programs.plainTimes(shortened, 1, false);
    checkSameWork(name, engine.runs, plain.runs);
    return {
      engineRun: engine.runs[0]!.ns / 1e6,
      plainRun: plain.runs[0]!.ns / 1e6,
      engineCpu: engine.runs[0]!.cpuNs / 1e6,
      plainCpu: plain.runs[0]!.cpuNs / 1e6,
      engineProcess: engine.processMs,
      plainProcess: plain.processMs,
    };
  });
  return {
    name: shortened.name,
    engineRunMs: spreadOf(pairs.map(({engineRun}) => engineRun)),
    plainRunMs: spreadOf(pairs.map(({plainRun}) => plainRun)),
    runRatio: spreadOf(pairs.map(({engineRun, plainRun}) => engineRun / plainRun)),
    engineCpuMs: spreadOf(pairs.map(({engineCpu}) => engineCpu)),
    plainCpuMs: spreadOf(pairs.map(({plainCpu}) => plainCpu)),
    cpuRatio: spreadOf(pairs.map(({engineCpu, plainCpu}) => engineCpu / plainCpu)),
    engineProcessMs: spreadOf(pairs.map(({engineProcess}) => engineProcess)),
    plainProcessMs: spreadOf(pairs.map(({plainProcess}) => plainProcess)),
    processRatio: spreadOf(
      pairs.map(({engineProcess, plainProcess}) => engineProcess / plainProcess),
    ),
  };
}
