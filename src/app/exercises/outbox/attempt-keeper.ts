import {type Batch, type Entry} from '#shared/attempts/attempt';
import {type LogEntry} from '#sim-core/index';
import {type KeptAttempt, type PersonDatabase} from '../../platform/person-database';
import {fitting} from './batch-size';

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
  noteTick(throughTick: number): Promise<void> {
    return this.change((attempt) => ({
      ...attempt,
      throughTick: Math.max(attempt.throughTick, throughTick),
    }));
  }

  /** Resolves when the entry is on the disk. */
  async add(entry: LogEntry): Promise<void> {
    await this.database.put('waiting', {attemptId: this.attemptId, n: entry.n, entry});
  }

  /** The oldest batch the server has not confirmed; fixes one from what waits when there is none. */
  async nextBatch(shownTick: number): Promise<Batch | null> {
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
    // What is left for later must not lie before the tick this batch claims; nothing comes after an end.
    const claimsAll = entries.length === waiting.length && last.kind !== 'end';
    const batch: Batch = {
      writerKey: attempt.writerKey,
      number,
      throughTick: claimsAll ? Math.max(last.tick, shownTick, attempt.throughTick) : last.tick,
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

  /** Keeps the server's log as the beginning of this attempt: another device wrote it. */
  useBase(base: readonly LogEntry[]): Promise<void> {
    return this.change((attempt) => ({...attempt, base}));
  }

  /** Entries that only this device has. */
  async countUnsent(): Promise<number> {
    const attempt = await this.read();
    if (attempt === undefined) return 0;
    const batches = await this.database.getAll('batches', this.range(attempt.ackedBatch + 1));
    const inBatches = batches.reduce((count, {batch}) => count + batch.entries.length, 0);
    return inBatches + (await this.database.count('waiting', this.range()));
  }

  /** Every entry this device has of the attempt, in order. */
  async entries(): Promise<LogEntry[]> {
    const attempt = await this.read();
    const batches = await this.database.getAll('batches', this.range());
    const waiting = await this.database.getAll('waiting', this.range());
    const byNumber = new Map<number, LogEntry>();
    for (const entry of [
      ...(attempt?.base ?? []),
      ...batches.flatMap(({batch}) => batch.entries as LogEntry[]),
      ...waiting.map(({entry}) => entry),
    ]) {
      byNumber.set(entry.n, entry);
    }
    return [...byNumber.values()].sort((a, b) => a.n - b.n);
  }

  /** Another device's log counts: what this one has is kept apart and sent no more. */
  async setAside(setAsideAt: string): Promise<void> {
    const entries = await this.entries();
    await this.database.add('setAside', {attemptId: this.attemptId, setAsideAt, entries});
    await this.forget();
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

  private range(first = 0): IDBKeyRange {
    return IDBKeyRange.bound([this.attemptId, first], [this.attemptId, Infinity]);
  }
}
