import type * as z from 'zod';
import {scenarioFaults, settingsOf} from '#sim-core/index';
import {Exercise} from '#shared/exercises/exercise';
import {type Problem} from '#shared/problem';
import {AppError} from '../../errors';
import {CriterionSchema} from './criterion-schema';
import {touchFaults} from './touch-rules';

type Fault = Problem['errors'][number];

/** Longest run in control ticks: the replay keeps a row of 96 bytes for each. */
const MOST_TICKS = 400_000;
/** Marks of all criteria together. */
const ALL_MARKS = 100;

/** Checks an exercise document whole, with every fault at once, before it is published. */
export function readExerciseDocument(document: unknown): Exercise {
  const shape = Exercise.safeParse(document);
  if (!shape.success) throw refusal(issueFaults('', shape.error));
  const exercise = shape.data;
  const faults = [
    ...scenarioFaults(exercise.scenario).map(({path, value, allowed}) => ({
      path: path === '' ? 'scenario' : `scenario.${path}`,
      message: `Allowed: ${allowed}`,
      ...(value !== undefined && {value}),
    })),
    ...exercise.criteria.flatMap((criterion, index) => {
      const checked = CriterionSchema.safeParse(criterion);
      return checked.success ? [] : issueFaults(`criteria.${index}`, checked.error);
    }),
    ...touchFaults(exercise.touch),
  ];
  if (faults.length === 0) faults.push(...crossFaults(exercise)); // they need sound parts
  if (faults.length > 0) throw refusal(faults);
  return exercise;
}

/** Rules between the parts. */
function crossFaults({scenario, criteria, limits, handOverS}: Exercise): Fault[] {
  const faults: Fault[] = [];
  const {simulatedS} = limits;
  const {sampleS} = settingsOf(scenario.controller);
  if (handOverS >= simulatedS)
    faults.push({
      path: 'handOverS',
      message: `Must be before limits.simulatedS (${simulatedS} s).`,
      value: handOverS,
    });
  if (simulatedS / sampleS > MOST_TICKS)
    faults.push({
      path: 'limits.simulatedS',
      message: `At most ${MOST_TICKS * sampleS} s at this sample period.`,
      value: simulatedS,
    });
  const marks = criteria.reduce(
    (sum, each) => sum + (each.kind === 'measure' ? each.weight : 0),
    0,
  );
  if (Math.abs(marks - ALL_MARKS) > 1e-6)
    faults.push({
      path: 'criteria',
      message: `The weights must add up to ${ALL_MARKS}.`,
      value: marks,
    });
  return faults;
}

function issueFaults(at: string, {issues}: z.ZodError): Fault[] {
  return issues.map(({path, message}) => ({
    path: [...(at === '' ? [] : [at]), ...path.map(String)].join('.'),
    message,
  }));
}

function refusal(errors: Fault[]): AppError {
  return new AppError('not-publishable', {
    detail: 'The exercise cannot be published as it is; see errors.',
    errors,
  });
}
