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
 * Joins both sides: the server's log is the beginning of what this device has, or the other way round. Null
 * when they differ: then another device wrote, and the server's log is the one that counts.
 */
export function joinLogs({server, here}: LogSides): TakenUp | null {
  const shared = Math.min(server.entries.length, here.entries.length);
  for (let place = 0; place < shared; place++) {
    if (!isSame(server.entries[place], here.entries[place])) return null;
  }
  const entries = server.entries.length >= here.entries.length ? server.entries : here.entries;
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
