import {type LogEntry} from '#sim-core/index';

/** Limits of one batch: the server takes 500 entries and 64 kB; some room is left for the frame around them. */
const MOST_ENTRIES = 500;
const MOST_BYTES = 64_000 - 1_000;

/** As many of the first entries as one batch may hold, at least one. */
export function fitting(entries: readonly LogEntry[]): LogEntry[] {
  const taken: LogEntry[] = [];
  const encoder = new TextEncoder();
  let bytes = 0;
  for (const entry of entries) {
    bytes += encoder.encode(JSON.stringify(entry)).length + 1; // its comma
    if (taken.length === MOST_ENTRIES || (taken.length > 0 && bytes > MOST_BYTES)) break;
    taken.push(entry);
  }
  return taken;
}
