import type * as z from 'zod';
import {type Attempt, type AttemptResult, type AttemptSummary} from '#shared/attempts/attempt';
import {type ExerciseToRun} from '#shared/exercises/exercise';
import {type AttemptEntity} from './attempt-entity';
import {type AttemptResultEntity} from './attempt-result-entity';

export type AttemptReply = z.input<typeof Attempt>;
export type SummaryReply = z.input<typeof AttemptSummary>;

/** One attempt in a list; its person, exercise and version must have been read. */
export function toSummary(attempt: AttemptEntity): SummaryReply {
  const {id, exercise, exerciseVersion, person, state, startedAt, handedInAt, result} = attempt;
  return {
    id,
    exercise: {id: exercise.id, number: exercise.number, title: exerciseVersion.title},
    person: {id: person.id, name: person.name},
    state,
    startedAt: startedAt.toISOString(),
    handedInAt: handedInAt?.toISOString() ?? null,
    score: result?.score ?? null,
    passed: result?.passed ?? null,
  };
}

/** One attempt with the exercise as it was run. */
export function toAttempt(attempt: AttemptEntity, exerciseDocument: ExerciseToRun): AttemptReply {
  const {seed, lastBatch, throughTick, state, failure, result} = attempt;
  return {
    ...toSummary(attempt),
    exerciseDocument,
    seed,
    lastBatch,
    throughTick,
    result: result ? toResult(result) : null,
    failure: state === 'failed' ? failure : null,
  };
}

function toResult(result: AttemptResultEntity): z.input<typeof AttemptResult> {
  const {score, passed, criteria, engine, hash, hashAgrees, scoredAt} = result;
  return {
    score,
    passed,
    criteria: criteria.map((each) => ({...each})),
    engine,
    hash,
    hashAgrees,
    scoredAt: scoredAt.toISOString(),
  };
}
