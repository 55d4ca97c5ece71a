import {HttpErrorResponse} from '@angular/common/http';
import {Problem, type ProblemCode} from '#shared/problem';

/** Why a call failed. `offline`: no answer came at all; `unreadable`: an answer that is not ours. */
export type FailureCode = ProblemCode | 'offline' | 'unreadable';

/** The one error that calls to the server throw. */
export class ApiFailure extends Error {
  constructor(
    readonly code: FailureCode,
    message: string,
    readonly problem: Problem | null = null,
  ) {
    super(message);
  }

  /** Number to tell whoever looks into the server's log. */
  get requestId(): string | null {
    return this.problem?.requestId ?? null;
  }
}

/** What an HTTP error means here. */
export function toApiFailure(error: unknown): ApiFailure {
  if (error instanceof ApiFailure) return error;
  if (!(error instanceof HttpErrorResponse)) throw error; // a bug of ours, not a failed call
  // 504: what a proxy says for a server that does not answer
  if (error.status === 0 || error.status === 504)
    return new ApiFailure('offline', 'The server did not answer.');

  const problem = Problem.safeParse(readBody(error.error));
  if (!problem.success) {
    return new ApiFailure('unreadable', `The server answered ${error.status} without saying why.`);
  }
  return new ApiFailure(problem.data.code, problem.data.detail ?? problem.data.title, problem.data);
}

/** Bodies of failed calls arrive as text when their media type is not plain JSON. */
function readBody(body: unknown): unknown {
  if (typeof body !== 'string') return body;
  try {
    return JSON.parse(body);
  } catch {
    return null; // a proxy's page, not our problem shape
  }
}
