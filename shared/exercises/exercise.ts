import * as z from 'zod';
import {type Criterion, type Scenario} from '#sim-core/index';
import {endpoint} from '../endpoint';

export const ExerciseId = z.uuid().brand<'ExerciseId'>();
export type ExerciseId = z.infer<typeof ExerciseId>;

/** What a trainee may touch: keys with the values allowed, and line commands with theirs. */
export const Touch = z.strictObject({
  settings: z.array(
    z.strictObject({
      key: z.string(),
      lowest: z.number().optional(),
      highest: z.number().optional(),
      choices: z.array(z.union([z.string(), z.boolean(), z.number()])).optional(),
    }),
  ),
  commands: z.array(
    z.strictObject({
      command: z.enum(['run', 'stop', 'fastStop']),
      /** [lowest, highest] m/s; the same twice when it is fixed. */
      speedMps: z.tuple([z.number(), z.number()]).optional(),
      rampS: z.tuple([z.number(), z.number()]),
    }),
  ),
});
export type Touch = z.infer<typeof Touch>;

/** The scenario and the criteria are checked whole where they are written (server); here only that they are objects. */
const ScenarioDocument = z.custom<Scenario>((value) => typeof value === 'object' && value !== null);
const CriterionDocument = z.custom<Criterion>(
  (value) => typeof value === 'object' && value !== null,
);

/** Exercise document, `exercise/1`, for those who write it. */
export const Exercise = z.strictObject({
  format: z.literal('evenspan.exercise/1'),
  number: z.int().min(1).max(999),
  title: z.string().min(1).max(120),
  level: z.int().min(1).max(5),
  topics: z.array(z.string().max(40)).max(8),
  minutes: z.int().min(1).max(120),
  /** Plain text; a line that begins with "- " is a list item. */
  brief: z.string().min(1).max(4000),
  /** Numbers of the handbook's cautions shown with it. */
  cautions: z.array(z.int().min(1).max(17)),
  scenario: ScenarioDocument,
  /** The engine runs to here before the trainee takes over [s]. */
  handOverS: z.number().min(0).max(600),
  target: z.strictObject({tensionN: z.number().positive(), toleranceN: z.number().positive()}),
  touch: Touch,
  limits: z.strictObject({
    simulatedS: z.number().positive().max(3600),
    tries: z.int().min(1).max(100).nullable(),
    entries: z.int().min(1).max(5000),
  }),
  time: z.strictObject({
    pause: z.enum(['free', 'counts', 'none']),
    factors: z.array(z.number().positive()),
  }),
  hints: z.array(z.strictObject({text: z.string().max(500), cost: z.number().min(0).max(100)})),
  criteria: z.array(CriterionDocument).min(1),
  passMark: z.number().min(0).max(100),
});
export type Exercise = z.infer<typeof Exercise>;

/** The exercise for those who run it: no hint texts, no answers, no model solution. */
export const ExerciseToRun = Exercise.omit({hints: true}).extend({
  hintCosts: z.array(z.number()),
});
export type ExerciseToRun = z.infer<typeof ExerciseToRun>;

/** One line of the library. */
export const ExerciseSummary = z.strictObject({
  id: ExerciseId,
  number: z.int(),
  title: z.string(),
  level: z.int(),
  topics: z.array(z.string()),
  minutes: z.int(),
  /** The caller's own attempts. */
  mine: z.strictObject({
    count: z.int(),
    best: z.number().nullable(),
    hasPassed: z.boolean(),
    openAttemptId: z.uuid().nullable(),
  }),
});
export type ExerciseSummary = z.infer<typeof ExerciseSummary>;

export const listExercises = endpoint({
  kind: 'json',
  method: 'get',
  path: '/exercises',
  access: 'exercises:read',
  summary: 'The published exercises of the organisation.',
  input: z.object({}),
  reply: z.array(ExerciseSummary),
});

export const readExercise = endpoint({
  kind: 'json',
  method: 'get',
  path: '/exercises/:exerciseId',
  access: 'exercises:read',
  summary: 'One exercise as it is run.',
  input: z.object({params: z.object({exerciseId: ExerciseId})}),
  reply: z.strictObject({summary: ExerciseSummary, exercise: ExerciseToRun}),
});
