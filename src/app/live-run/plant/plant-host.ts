import {
  type LogEntry,
  replay,
  type Run,
  ScenarioError,
  startRun,
  TraceBlock,
} from '#sim-core/index';
import {
  type FromPlant,
  type Rows,
  type RunStart,
  type Standing,
  type ToPlant,
} from './run-messages';

/** The plant's side of the messages. Has no clock: it runs as many ticks as it is asked for. */
export class PlantHost {
  private run: Run | null = null;
  private eventsTold = 0;

  answer(message: ToPlant): FromPlant {
    try {
      return this.obey(message);
    } catch (error) {
      // ScenarioError: a document or a value that the engine refuses; anything else is a bug.
      if (error instanceof ScenarioError) return {kind: 'refused', faults: error.faults};
      throw error;
    }
  }

  private obey(message: ToPlant): FromPlant {
    switch (message.kind) {
      case 'start':
        return this.start(message.start);
      case 'act':
        return this.acted(this.started().act(message.act));
      case 'note':
        return this.acted(this.started().note(message.note));
      case 'end':
        return this.acted(this.started().note({kind: 'end', hash: this.started().hash()}));
      case 'hash':
        return {kind: 'hashed', hash: this.started().hash()};
      case 'advance':
        return this.advance(message.ticks);
    }
  }

  private start({document, handOverTick, entries, throughTick}: RunStart): FromPlant {
    const ticks = Math.max(handOverTick, throughTick);
    const block = new TraceBlock(ticks);
    if (entries.length > 0) this.run = replay(document, entries, ticks, block);
    else {
      this.run = startRun(document);
      this.run.advance(ticks, block);
    }
    this.eventsTold = 0;
    return {kind: 'started', standing: this.standing(), trace: rowsOf(block)};
  }

  private advance(ticks: number): FromPlant {
    const block = new TraceBlock(ticks);
    this.started().advance(ticks, block);
    return {kind: 'rows', standing: this.standing(), trace: rowsOf(block)};
  }

  private acted(entry: LogEntry): FromPlant {
    return {kind: 'acted', entry, standing: this.standing()};
  }

  private standing(): Standing {
    const run = this.started();
    const events = run.events.slice(this.eventsTold);
    this.eventsTold = run.events.length;
    return {view: run.view(), outcome: run.outcome, events, settings: run.settings()};
  }

  private started(): Run {
    if (this.run === null) throw new Error('the plant was asked before it was started');
    return this.run;
  }
}

function rowsOf(block: TraceBlock): Rows {
  return {rows: block.rows, count: block.count};
}
