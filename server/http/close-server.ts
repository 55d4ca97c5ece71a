import {type Server} from 'node:http';
import {type EventHub} from '../events/event-hub';

/** Calls in flight at a shutdown may end within this [ms]. */
const END_WITHIN_MS = 10_000;

/** Takes no more calls, ends the event streams and lets the calls in flight end. */
export async function closeServer(
  server: Server,
  events: EventHub,
  withinMs = END_WITHIN_MS,
): Promise<void> {
  const closed = new Promise<void>((resolve) => server.close(() => resolve()));
  events.endAll(); // else the server never closes
  server.closeIdleConnections();
  const late = setTimeout(() => server.closeAllConnections(), withinMs);
  await closed;
  clearTimeout(late);
}
