import {
  type Act,
  type LogEntry,
  type Note,
  type Outcome,
  type Run,
  type RunEvent,
  type RunView,
  ScenarioError,
  startRun,
  TRACE_COLUMNS,
  TraceBlock,
} from '#sim-core/index';

/** One thing done in a live session. */
export type Step =
  {readonly ticks: number} | {readonly act: Act} | {readonly note: Exclude<Note, {kind: 'end'}>};

/** A session to be lived: plain data, so that a browser can be given it. */
export interface Plan {
  readonly name: string;
  readonly document: unknown;
  readonly steps: readonly Step[];
}

/** What came of a session. */
export interface Lived {
  readonly name: string;
  readonly hash: string;
  /** Over the bits of every row. */
  readonly rows: string;
  readonly outcome: Outcome;
  readonly events: readonly RunEvent[];
  readonly view: RunView;
  readonly throughTick: number;
  /** As it would be sent, with the end. */
  readonly log: readonly LogEntry[];
  /** Acts that the run refused. */
  readonly refused: number;
}

/** Lives a session. An act that the run refuses is left out, as the page leaves it out. */
export function live({name, document, steps}: Plan): Lived {
  const run = startRun(document);
  const log: LogEntry[] = [];
  const rows = new RowBits();
  let refused = 0;
  for (const step of steps) {
    if ('ticks' in step) rows.add(run, step.ticks);
    else if ('note' in step) log.push(run.note(step.note));
    else {
      try {
        log.push(run.act(step.act));
      } catch (error) {
        if (!(error instanceof ScenarioError)) throw error; // refused: the person sees why
        refused++;
      }
    }
  }
  log.push(run.note({kind: 'end', hash: run.hash()}));
  return {name, ...endOf(run), rows: rows.text(), throughTick: run.tick, log, refused};
}

/** How a run stands, in what has to be the same when it is run again. */
export function endOf(run: Run): Pick<Lived, 'hash' | 'outcome' | 'events' | 'view'> {
  return {hash: run.hash(), outcome: run.outcome, events: [...run.events], view: run.view()};
}

/** FNV-1a over the 32-bit words of every row. */
class RowBits {
  private readonly block = new TraceBlock(512);
  private readonly words = new Uint32Array(this.block.rows.buffer);
  private sum = 0x811c9dc5;

  /** Runs the ticks with rows. */
  add(run: Run, ticks: number): void {
    for (let left = ticks; left > 0;) {
      this.block.count = 0;
      const ran = run.advance(Math.min(left, this.block.capacity), this.block);
      if (ran === 0) return;
      const count = this.block.count * TRACE_COLUMNS.length * 2;
      for (let i = 0; i < count; i++) this.sum = Math.imul(this.sum ^ this.words[i]!, 0x01000193);
      left -= ran;
    }
  }

  text(): string {
    return (this.sum >>> 0).toString(16).padStart(8, '0');
  }
}
