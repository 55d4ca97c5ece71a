import {type Batch, type Entry} from '#shared/attempts/attempt';
import {type LogEntry} from '#sim-core/index';
import {type KeptAttempt, type PersonDatabase} from '../../platform/person-database';

/** Limits of one batch: the server takes 500 entries and 64 kB; some room is left for the frame around them. */
const MOST_ENTRIES = 500;
const MOST_BYTES = 60_000;

/** Keeps one attempt safe on this device: its entries first, then the batches they travel in. */
export class AttemptKeeper {
  constructor(
    private readonly database: PersonDatabase,
    readonly attemptId: string,
  ) {}

  read(): Promise<KeptAttempt | undefined> {
    return this.database.get('attempts', this.attemptId);
  }

  async save(attempt: KeptAttempt): Promise<void> {
    await this.database.put('attempts', attempt);
  }

  /** Notes how far the run was shown; never goes back. */
  async noteTick(throughTick: number): Promise<void> {
    await this.change((attempt) => ({
      ...attempt,
      throughTick: Math.max(attempt.throughTick, throughTick),
    }));
  }

  /** Resolves when the entry is on the disk. */
  async add(entry: LogEntry): Promise<void> {
    await this.database.put('waiting', {attemptId: this.attemptId, n: entry.n, entry});
  }

  /** The oldest batch the server has not confirmed; fixes one from what waits when there is none. */
  async nextBatch(throughTick: number): Promise<Batch | null> {
    const change = this.database.transaction(['attempts', 'batches', 'waiting'], 'readwrite');
    const attempt = await change.objectStore('attempts').get(this.attemptId);
    if (attempt === undefined) return null;
    const number = attempt.ackedBatch + 1;
    const fixed = await change.objectStore('batches').get([this.attemptId, number]);
    if (fixed !== undefined) {
      await change.done;
      return {...fixed.batch, writerKey: attempt.writerKey};
    }

    const waiting = await change.objectStore('waiting').getAll(this.range());
    const entries = fitting(waiting.map(({entry}) => entry));
    const last = entries.at(-1);
    if (last === undefined) {
      await change.done;
      return null;
    }
    // What is left for later must not lie before the tick this batch claims.
    const isAll = entries.length === waiting.length;
    const batch: Batch = {
      writerKey: attempt.writerKey,
      number,
      throughTick: isAll && last.kind !== 'end' ? Math.max(last.tick, throughTick) : last.tick,
      entries: entries as Entry[],
    };
    await change.objectStore('batches').put({attemptId: this.attemptId, number, batch});
    for (const {n} of entries) await change.objectStore('waiting').delete([this.attemptId, n]);
    await change.done;
    return batch;
  }

  /** The server has this batch and all before it. */
  acknowledge(number: number): Promise<void> {
    return this.change((attempt) => ({
      ...attempt,
      ackedBatch: Math.max(attempt.ackedBatch, number),
    }));
  }

  /** The server wants this batch next: what it lost is sent again from what is kept. */
  rewindTo(wanted: number): Promise<void> {
    return this.change((attempt) => ({...attempt, ackedBatch: wanted - 1}));
  }

  useWriterKey(writerKey: string): Promise<void> {
    return this.change((attempt) => ({...attempt, writerKey}));
  }

  /** Entries that only this device has. */
  async countUnsent(): Promise<number> {
    const attempt = await this.read();
    if (attempt === undefined) return 0;
    const batches = await this.database.getAll('batches', this.range());
    const inBatches = batches
      .filter(({number}) => number > attempt.ackedBatch)
      .reduce((count, {batch}) => count + batch.entries.length, 0);
    return inBatches + (await this.database.count('waiting', this.range()));
  }

  /** Every entry this device has of the attempt, in order. */
  async entries(): Promise<LogEntry[]> {
    const batches = await this.database.getAll('batches', this.range());
    const waiting = await this.database.getAll('waiting', this.range());
    return [
      ...batches.flatMap(({batch}) => batch.entries as LogEntry[]),
      ...waiting.map(({entry}) => entry),
    ].sort((a, b) => a.n - b.n);
  }

  /** The attempt is over and the server has all of it. */
  async forget(): Promise<void> {
    const change = this.database.transaction(['attempts', 'batches', 'waiting'], 'readwrite');
    await change.objectStore('attempts').delete(this.attemptId);
    await change.objectStore('batches').delete(this.range());
    await change.objectStore('waiting').delete(this.range());
    await change.done;
  }

  private async change(how: (attempt: KeptAttempt) => KeptAttempt): Promise<void> {
    const change = this.database.transaction('attempts', 'readwrite');
    const attempt = await change.store.get(this.attemptId);
    if (attempt !== undefined) await change.store.put(how(attempt));
    await change.done;
  }

  private range(): IDBKeyRange {
    return IDBKeyRange.bound([this.attemptId, 0], [this.attemptId, Infinity]);
  }
}

/** As many of the first entries as one batch may hold. */
function fitting(entries: readonly LogEntry[]): LogEntry[] {
  const taken: LogEntry[] = [];
  let bytes = 0;
  for (const entry of entries) {
    bytes += new TextEncoder().encode(JSON.stringify(entry)).length + 1;
    if (taken.length === MOST_ENTRIES || (taken.length > 0 && bytes > MOST_BYTES)) break;
    taken.push(entry);
  }
  return taken;
}
