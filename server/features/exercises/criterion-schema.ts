import * as z from 'zod';
import {type Criterion, PHASES} from '#sim-core/index';

const CommandRef = z.strictObject({
  command: z.enum(['run', 'stop', 'fastStop']),
  nth: z.int().min(-100).max(100),
  fromSpeedMps: z.exactOptional(z.number().nonnegative()),
});
const TimeS = z.number().min(0).max(3600);

const Window = z.discriminatedUnion('kind', [
  z
    .strictObject({kind: z.literal('times'), fromS: TimeS, toS: TimeS})
    .refine(({fromS, toS}) => fromS < toS, {path: ['toS'], error: 'Must be after fromS.'}),
  z.strictObject({
    kind: z.literal('phase'),
    phase: z.enum(PHASES),
    nth: z.int().min(0).max(100),
  }),
  z.strictObject({
    kind: z.literal('commands'),
    from: CommandRef,
    then: z.exactOptional(
      z.strictObject({
        command: z.enum(['run', 'stop']),
        withinS: z.tuple([TimeS, TimeS]),
      }),
    ),
    forS: z.exactOptional(TimeS.min(0.001)),
    atLeastS: z.exactOptional(TimeS),
  }),
]);

const measured = {
  measure: z.enum(['peakN', 'leastN', 'loopM', 'restN', 'inToleranceShare']),
  window: Window,
};

/** One criterion, whole: what the wire's schema leaves open is checked here, where exercises are written. */
export const CriterionSchema = z.discriminatedUnion('kind', [
  z
    .strictObject({
      kind: z.literal('measure'),
      ...measured,
      full: z.number(),
      zero: z.number(),
      weight: z.number().positive().max(100),
    })
    .refine(({full, zero}) => full !== zero, {path: ['zero'], error: 'Must differ from full.'}),
  z.strictObject({kind: z.literal('mustNot'), ...measured, limit: z.number()}),
]) satisfies z.ZodType<Criterion>;
