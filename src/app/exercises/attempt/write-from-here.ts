import {type Attempt} from '#shared/attempts/attempt';
import {type LogEntry} from '#sim-core/index';
import {toApiFailure} from '../../platform/api-failure';
import {type AttemptKeeper} from '../outbox/attempt-keeper';

/** What taking an attempt over needs of the server. */
export interface TakeOverCalls {
  takeOver(attemptId: string, writerKey: string): Promise<Attempt>;
  log(attemptId: string): Promise<{entries: readonly LogEntry[]; lastBatch: number}>;
}

/**
 * Makes this device the one that writes an attempt. What it has of it stays; on a new device the server's log
 * is where it begins. False when the attempt is over. Throws ApiFailure.
 */
export async function writeFromHere(api: TakeOverCalls, keeper: AttemptKeeper): Promise<boolean> {
  const writerKey = crypto.randomUUID();
  try {
    const attempt = await api.takeOver(keeper.attemptId, writerKey);
    if ((await keeper.read()) !== undefined) {
      await keeper.useWriterKey(writerKey);
      return true;
    }
    const {entries, lastBatch} = await api.log(keeper.attemptId);
    await keeper.save({
      id: attempt.id,
      exerciseId: attempt.exercise.id,
      writerKey,
      document: attempt.exerciseDocument,
      seed: attempt.seed,
      ackedBatch: lastBatch,
      throughTick: attempt.throughTick,
      base: entries,
    });
    return true;
  } catch (error) {
    const failure = toApiFailure(error);
    if (failure.code !== 'attempt-over') throw failure;
    return false;
  }
}
