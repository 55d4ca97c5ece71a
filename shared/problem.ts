import * as z from 'zod';

/** Every way a call can fail; a client may act on each. One line per code, in alphabetical order. */
export const PROBLEM_STATUS = {
  'attempt-over': 422,
  'batch-differs': 409,
  'batch-missing': 409,
  'body-too-large': 413,
  'entry-refused': 422,
  'forged-request': 403,
  'in-use': 409,
  internal: 500,
  'invalid-input': 400,
  'not-allowed': 403,
  'not-found': 404,
  'not-publishable': 422,
  'not-signed-in': 401,
  'replay-limit': 422,
  'too-fast': 422,
  'too-many-requests': 429,
  unavailable: 503,
  'unsupported-media': 415,
  'version-conflict': 409,
  'writer-changed': 409,
} as const;
export type ProblemCode = keyof typeof PROBLEM_STATUS;

/** The single failure shape (RFC 9457), sent as `application/problem+json`. */
export const Problem = z.object({
  type: z.string(),
  code: z.enum(Object.keys(PROBLEM_STATUS) as [ProblemCode, ...ProblemCode[]]),
  title: z.string(),
  detail: z.string().optional(),
  status: z.int(),
  requestId: z.string(),
  /** What was wrong where: `path` like `body.entries.3.tick`, `value` as sent. */
  errors: z.array(z.object({path: z.string(), message: z.string(), value: z.unknown().optional()})),
  /** The batch number the server wants, with `batch-missing`. */
  wanted: z.int().optional(),
  /** Seconds to wait, with `too-many-requests`. */
  retryAfterS: z.number().optional(),
});
export type Problem = z.infer<typeof Problem>;

/** `type` of a problem with this code. */
export const PROBLEM_TYPE_PREFIX = 'urn:evenspan:problem:';
