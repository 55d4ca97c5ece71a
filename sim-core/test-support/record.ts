import {startRun} from '../run/replay';
import {type Run} from '../run/run';
import {PHASES, TraceBlock, type TraceColumn} from '../run/trace';
import {type Scenario} from '../scenario/scenario';

/** A run with its rows, one each control tick. */
export interface Recorded {
  readonly run: Run;
  readonly block: TraceBlock;
  /** Value at `tS` [s]. */
  readonly at: (tS: number, column: TraceColumn) => number;
  readonly phaseAt: (tS: number) => string;
  readonly column: (column: TraceColumn) => number[];
}

/** Runs a document for `lengthS` [s]. */
export function record(scenario: Scenario, lengthS = scenario.durationS): Recorded {
  const run = startRun(scenario);
  const sampleS = run.settings()['sampleS'] as number;
  const ticks = Math.round(lengthS / sampleS) + 1;
  const block = new TraceBlock(ticks);
  run.advance(ticks, block);
  const rowOf = (tS: number): number => Math.round(tS / sampleS);
  return {
    run,
    block,
    at: (tS, column) => block.at(rowOf(tS), column),
    phaseAt: (tS) => PHASES[block.at(rowOf(tS), 'phase')]!,
    column: (column) => Array.from({length: block.count}, (_, row) => block.at(row, column)),
  };
}
