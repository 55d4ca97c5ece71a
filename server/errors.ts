import type * as z from 'zod';
import {PROBLEM_STATUS, type Problem, type ProblemCode} from '#shared/problem';

/** What may be told beside the code. */
export interface ProblemDetails {
  readonly detail?: string;
  readonly errors?: Problem['errors'];
  /** The batch number the server wants. */
  readonly wanted?: number;
  /** Seconds to wait. */
  readonly retryAfterS?: number;
}

/** A call refused for a reason the caller may know. Anything else thrown is our bug and answered `internal`. */
export class AppError extends Error {
  readonly status: number;

  constructor(
    readonly code: ProblemCode,
    readonly details: ProblemDetails = {},
  ) {
    super(details.detail ?? code);
    this.name = 'AppError';
    this.status = PROBLEM_STATUS[code];
  }
}

/** What came in does not fit the endpoint's schema. */
export class InvalidInputError extends AppError {
  constructor(error: z.ZodError, input: unknown) {
    super('invalid-input', {
      detail: 'Some of what was sent is not allowed; see errors.',
      errors: error.issues.map(({path, message}) => ({
        path: path.join('.'),
        message,
        ...valueAt(input, path),
      })),
    });
  }
}

/** A reply of ours does not fit its own schema: a bug, logged and answered `internal`. */
export class ReplyMismatchError extends Error {
  constructor(path: string, cause: z.ZodError) {
    super(`the reply of ${path} does not fit its schema: ${cause.message}`, {cause});
    this.name = 'ReplyMismatchError';
  }
}

/** Long values come back cut, so that a refusal is never larger than what was refused. */
const LONGEST_VALUE = 200;

function valueAt(input: unknown, path: readonly PropertyKey[]): {value?: unknown} {
  let value: unknown = input;
  for (const key of path) {
    if (typeof value !== 'object' || value === null) return {};
    value = (value as Record<PropertyKey, unknown>)[key];
  }
  if (value === undefined || isSecret(path)) return {};
  const text = JSON.stringify(value);
  return {value: text.length <= LONGEST_VALUE ? value : `${text.slice(0, LONGEST_VALUE)}…`};
}

function isSecret(path: readonly PropertyKey[]): boolean {
  return path.some((key) => /password|token|secret/i.test(String(key)));
}
