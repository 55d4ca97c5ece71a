import {type LogEntry} from '#sim-core/index';

/** Where an attempt goes on: its whole log, and how far it was shown. */
export interface TakenUp {
  readonly entries: readonly LogEntry[];
  readonly throughTick: number;
}

/** The server's log, and what this device has of the same attempt. */
export interface LogSides {
  readonly server: TakenUp;
  readonly here: TakenUp;
}

/**
 * Joins both sides by the entries' numbers: what both have is the same, and together they have no gap. Null
 * when they differ: then another device wrote, and the server's log is the one that counts.
 */
export function joinLogs({server, here}: LogSides): TakenUp | null {
  const entries = [...server.entries];
  for (const entry of here.entries) {
    const known = entries[entry.n - 1];
    if (known === undefined && entry.n !== entries.length + 1) return null;
    if (known !== undefined && !isSame(known, entry)) return null;
    entries[entry.n - 1] = entry;
  }
  const throughTick = Math.max(server.throughTick, here.throughTick, entries.at(-1)?.tick ?? 0);
  return {entries, throughTick};
}

/** Order of keys does not count: a database may give them back in another. */
function isSame(one: unknown, other: unknown): boolean {
  if (typeof one !== 'object' || typeof other !== 'object' || one === null || other === null) {
    return one === other;
  }
  const keys = Object.keys(one);
  return (
    keys.length === Object.keys(other).length &&
    keys.every((key) =>
      isSame((one as Record<string, unknown>)[key], (other as Record<string, unknown>)[key]),
    )
  );
}
