import type * as z from 'zod';
import {type Exercise, type ExerciseSummary, type ExerciseToRun} from '#shared/exercises/exercise';

export type Mine = ExerciseSummary['mine'];

/** Nobody's first look: no attempt yet. */
const NO_ATTEMPT: Mine = {count: 0, best: null, hasPassed: false, openAttemptId: null};

/** What the library shows of an exercise. */
export function toSummary(
  id: string,
  {number, title, level, topics, minutes}: Exercise,
  mine: Mine = NO_ATTEMPT,
): z.input<typeof ExerciseSummary> {
  return {id, number, title, level, topics, minutes, mine};
}

/** The exercise for those who run it: what a hint costs, not what it says. */
export function toRun({hints, ...exercise}: Exercise): ExerciseToRun {
  return {...exercise, hintCosts: hints.map(({cost}) => cost)};
}
