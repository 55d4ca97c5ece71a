import * as z from 'zod';
import {type LogEntry} from '#sim-core/index';
import {endpoint} from '../endpoint';
import {ExerciseId, ExerciseToRun} from '../exercises/exercise';
import {PersonId} from '../session/session';

export const AttemptId = z.uuid().brand<'AttemptId'>();
export type AttemptId = z.infer<typeof AttemptId>;

/** running → handed-in (waits for the scoring job) → scored; failed when the job could not finish. */
export const AttemptState = z.enum(['running', 'handed-in', 'scored', 'failed']);
export type AttemptState = z.infer<typeof AttemptState>;

/** A place on a trend. */
export const Place = z.strictObject({
  fromTick: z.int(),
  toTick: z.int(),
  trace: z.enum(['tension', 'measured', 'setPoint', 'output', 'line']),
});

/** What the replay of the stored log gave, and nothing else. */
export const AttemptResult = z.strictObject({
  score: z.number().min(0).max(100),
  passed: z.boolean(),
  criteria: z.array(
    z.strictObject({
      index: z.int(),
      value: z.number().nullable(),
      marks: z.number(),
      reason: z.enum(['full', 'part', 'none', 'notDone', 'brokeBefore', 'kept', 'overLimit']),
      place: Place.nullable(),
    }),
  ),
  /** Engine number it was scored with. */
  engine: z.int(),
  /** Trace hash of the server's replay. */
  hash: z.string(),
  /** Whether the trainee's browser reported the same hash. */
  hashAgrees: z.boolean(),
  scoredAt: z.iso.datetime(),
});
export type AttemptResult = z.infer<typeof AttemptResult>;

/** One attempt in a list. */
export const AttemptSummary = z.strictObject({
  id: AttemptId,
  exercise: z.strictObject({id: ExerciseId, number: z.int(), title: z.string()}),
  person: z.strictObject({id: PersonId, name: z.string()}),
  state: AttemptState,
  startedAt: z.iso.datetime(),
  handedInAt: z.iso.datetime().nullable(),
  score: z.number().nullable(),
  passed: z.boolean().nullable(),
});
export type AttemptSummary = z.infer<typeof AttemptSummary>;

/** One attempt, whole, but for its log. `seed` replaces the scenario's. */
export const Attempt = AttemptSummary.extend({
  exerciseDocument: ExerciseToRun,
  seed: z.int(),
  /** Number of the last batch stored; 0 before the first. */
  lastBatch: z.int(),
  /** Last tick the server knows of, from batches and beats. */
  throughTick: z.int(),
  result: AttemptResult.nullable(),
  /** What went wrong, when `failed`. */
  failure: z.string().nullable(),
});
export type Attempt = z.infer<typeof Attempt>;

/** Shape of an entry as it travels; keys and ranges of `set`, `line`, `disturb` are checked against the exercise. */
const stamp = {n: z.int().min(1), tick: z.int().min(0)};
const NumberOrText = z.union([z.string().max(200), z.number()]);
export const Entry = z.discriminatedUnion('kind', [
  z.strictObject({
    ...stamp,
    kind: z.literal('set'),
    set: z.record(z.string().max(40), z.unknown()),
  }),
  z.strictObject({
    ...stamp,
    kind: z.literal('line'),
    line: z.record(z.string().max(40), z.unknown()),
  }),
  z.strictObject({
    ...stamp,
    kind: z.literal('disturb'),
    disturb: z.record(z.string().max(40), z.unknown()),
  }),
  z.strictObject({...stamp, kind: z.literal('pause')}),
  z.strictObject({...stamp, kind: z.literal('resume')}),
  z.strictObject({...stamp, kind: z.literal('factor'), factor: z.number().positive()}),
  z.strictObject({...stamp, kind: z.literal('hint'), hint: z.int().min(0)}),
  z.strictObject({
    ...stamp,
    kind: z.literal('answer'),
    question: z.int().min(0),
    answer: NumberOrText,
  }),
  z.strictObject({
    ...stamp,
    kind: z.literal('namedFault'),
    fault: z.string().max(40),
    place: Place.optional(),
  }),
  z.strictObject({...stamp, kind: z.literal('end'), hash: z.string().regex(/^[0-9a-f]{16}$/)}),
]);
export type Entry = z.infer<typeof Entry>;
/** The stored log, as the engine takes it. */
const StoredEntry = z.custom<LogEntry>((value) => typeof value === 'object' && value !== null);

/** One batch of the log: number counts from 1 without gaps. */
export const Batch = z.strictObject({
  writerKey: z.uuid(),
  number: z.int().min(1),
  throughTick: z.int().min(0),
  entries: z.array(Entry).min(1).max(500),
});
export type Batch = z.infer<typeof Batch>;

/** Where the simulation stands, between batches. */
export const Beat = z.strictObject({writerKey: z.uuid(), throughTick: z.int().min(0)});
export type Beat = z.infer<typeof Beat>;

const byId = {params: z.object({attemptId: AttemptId})};

export const startAttempt = endpoint({
  kind: 'json',
  method: 'put',
  path: '/attempts/:attemptId',
  access: 'attempts:run',
  summary: 'Start an attempt under an id made by the client; repeating it is harmless.',
  input: z.object({...byId, body: z.strictObject({exerciseId: ExerciseId, writerKey: z.uuid()})}),
  reply: Attempt,
});

export const readAttempt = endpoint({
  kind: 'json',
  method: 'get',
  path: '/attempts/:attemptId',
  access: 'signed-in',
  summary: 'One attempt: own, or any of the organisation for those who may read others.',
  input: z.object(byId),
  reply: Attempt,
});

export const readAttemptLog = endpoint({
  kind: 'json',
  method: 'get',
  path: '/attempts/:attemptId/log',
  access: 'signed-in',
  summary: 'The stored log of one attempt.',
  input: z.object(byId),
  reply: z.strictObject({entries: z.array(StoredEntry), lastBatch: z.int(), throughTick: z.int()}),
});

export const takeOverAttempt = endpoint({
  kind: 'json',
  method: 'put',
  path: '/attempts/:attemptId/writer',
  access: 'attempts:run',
  summary: 'Write from here from now on; the old writer is refused with writer-changed.',
  input: z.object({...byId, body: z.strictObject({writerKey: z.uuid()})}),
  reply: Attempt,
});

export const sendBatch = endpoint({
  kind: 'json',
  method: 'post',
  path: '/attempts/:attemptId/batches',
  access: 'attempts:run',
  summary: 'Append to the log; all or nothing. An `end` entry hands the attempt in.',
  input: z.object({...byId, body: Batch}),
  reply: z.strictObject({lastBatch: z.int(), state: AttemptState}),
});

export const sendBeat = endpoint({
  kind: 'json',
  method: 'post',
  path: '/attempts/:attemptId/beats',
  access: 'attempts:run',
  summary: 'Tell how far the simulation is; the answer says how soon to tell again.',
  input: z.object({...byId, body: Beat}),
  reply: z.strictObject({nextBeatS: z.number()}),
});

/** Lists by keyset: pass `cursor` of the last reply to read on. */
export const ListQuery = z.object({
  cursor: z.string().max(200).optional(),
  limit: z.coerce.number().int().min(1).max(100).default(50),
  exerciseId: ExerciseId.optional(),
});
const AttemptPage = z.strictObject({
  items: z.array(AttemptSummary),
  nextCursor: z.string().nullable(),
});

export const listOwnAttempts = endpoint({
  kind: 'json',
  method: 'get',
  path: '/attempts/mine',
  access: 'attempts:read-own',
  summary: "The caller's own attempts, newest first.",
  input: z.object({query: ListQuery}),
  reply: AttemptPage,
});

export const listAttempts = endpoint({
  kind: 'json',
  method: 'get',
  path: '/attempts',
  access: 'attempts:read-others',
  summary: 'All attempts of the organisation, newest first.',
  input: z.object({query: ListQuery.extend({q: z.string().max(100).optional()})}),
  reply: AttemptPage,
});

export const downloadAttempts = endpoint({
  kind: 'download',
  method: 'get',
  path: '/attempts.csv',
  access: 'attempts:read-others',
  summary: 'The same list as CSV.',
  input: z.object({}),
  mediaType: 'text/csv; charset=utf-8',
});
