import {type MessagePort} from 'node:worker_threads';
import {ENGINE, ScenarioError, scoreLog} from '#sim-core/index';
import {type ReplayAnswer, type ReplayWork} from './replay';

/** Runs in a thread of the worker process: an error thrown here would lose its class on the way back. */
export function replayAndScore({
  work: {exercise, entries, throughTick},
  began,
}: {
  readonly work: ReplayWork;
  readonly began: MessagePort;
}): ReplayAnswer {
  began.postMessage('began');
  began.close();
  try {
    const {score, hash} = scoreLog(exercise, entries, throughTick);
    return {kind: 'scored', score, hash, engine: ENGINE};
  } catch (error) {
    if (error instanceof ScenarioError) return {kind: 'refused', reason: error.message}; // a log that the engine refuses
    throw error;
  }
}
