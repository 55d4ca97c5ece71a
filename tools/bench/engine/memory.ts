import {type Scenario} from '#sim-core/index';
import {TraceStore} from '../../../src/app/live-run/trace/trace-store';
import {type Engine} from './engine';

/** Memory [MB, 10⁶ bytes] that an hour of a run takes in the Bench: its rows as the client keeps them, and all in all. */
export interface Memory {
  readonly rowsMb: number;
  readonly grownMb: number;
}

const HOUR_TICKS = 360_000;
const AT_ONCE = 1000;

export function hourOfRows(engine: Engine, document: Scenario): Memory {
  const before = all();
  const run = engine.startRun({...document, durationS: 3600});
  const store = new TraceStore();
  for (let tick = 0; tick < HOUR_TICKS; tick += AT_ONCE) {
    const block = new engine.TraceBlock(AT_ONCE);
    run.advance(AT_ONCE, block);
    store.append(block);
  }
  const rowsMb = (store.bytesPerRow * store.count) / 1e6;
  return {rowsMb, grownMb: all() - before};
}

function all(): number {
  const {heapUsed, arrayBuffers} = process.memoryUsage();
  return (heapUsed + arrayBuffers) / 1e6;
}
