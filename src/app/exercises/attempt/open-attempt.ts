import {type Attempt} from '#shared/attempts/attempt';
import {type LogEntry} from '#sim-core/index';
import {type FailureCode, toApiFailure} from '../../platform/api-failure';
import {type KeptAttempt} from '../../platform/person-database';
import {type AttemptKeeper} from '../outbox/attempt-keeper';
import {joinLogs, type TakenUp} from './take-up';

/** Without an answer, or with none that says anything about the attempt, this device goes on by itself. */
const SERVER_IS_AWAY: readonly FailureCode[] = [
  'internal',
  'offline',
  'too-many-requests',
  'unavailable',
  'unreadable',
];

/** The server's side of an attempt. */
export interface AttemptSource {
  attempt(attemptId: string): Promise<Attempt>;
  log(
    attemptId: string,
  ): Promise<{entries: readonly LogEntry[]; lastBatch: number; throughTick: number}>;
}

/** What an attempt is found to be. */
export type Opened =
  | {readonly kind: 'handedIn'}
  /** Nothing of it is on this device. */
  | {readonly kind: 'otherDevice'}
  /** Both sides were written to. */
  | {readonly kind: 'differs'}
  | {readonly kind: 'ready'; readonly kept: KeptAttempt; readonly log: TakenUp};

/** Finds an attempt: server's log and this device's entries, joined. Throws ApiFailure when neither can be had. */
export async function openAttempt(source: AttemptSource, keeper: AttemptKeeper): Promise<Opened> {
  const kept = await keeper.read();
  const server = await readServer(source, keeper.attemptId, kept !== undefined);
  if (server !== null && server.attempt.state !== 'running') return {kind: 'handedIn'};
  if (kept === undefined) return {kind: 'otherDevice'};

  const here: TakenUp = {entries: await keeper.entries(), throughTick: kept.throughTick};
  if (server === null) return {kind: 'ready', kept, log: here};
  const log = joinLogs({server: server.log, here});
  if (log === null) return {kind: 'differs'};

  await keeper.acknowledge(server.log.lastBatch);
  // What another device added must also be here when the connection is gone.
  if (log.entries.length > here.entries.length) await keeper.useBase(server.log.entries);
  return {kind: 'ready', kept, log};
}

async function readServer(source: AttemptSource, attemptId: string, isKeptHere: boolean) {
  try {
    const [attempt, log] = await Promise.all([source.attempt(attemptId), source.log(attemptId)]);
    return {attempt, log};
  } catch (error) {
    const failure = toApiFailure(error);
    if (isKeptHere && SERVER_IS_AWAY.includes(failure.code)) return null;
    throw failure;
  }
}
