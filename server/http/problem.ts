import {type ErrorRequestHandler, type RequestHandler} from 'express';
import {PROBLEM_STATUS, PROBLEM_TYPE_PREFIX, type Problem, type ProblemCode} from '#shared/problem';
import {AppError} from '../errors';

const TITLES: Record<ProblemCode, string> = {
  'attempt-over': 'The attempt is over.',
  'batch-differs': 'This batch was stored with another content.',
  'batch-missing': 'A batch before this one is missing.',
  'body-too-large': 'Too much was sent at once.',
  'entry-refused': 'An entry of the log is not allowed.',
  'forged-request': 'The call does not come from our own page.',
  'in-use': 'It is in use.',
  internal: 'Something went wrong on our side.',
  'invalid-input': 'Something that was sent is not allowed.',
  'not-allowed': 'You may not do this.',
  'not-found': 'There is nothing here.',
  'not-publishable': 'It cannot be published yet.',
  'not-signed-in': 'Nobody is signed in.',
  'replay-limit': 'The run is too long to be run again.',
  'too-fast': 'The run is further than time allows.',
  'too-many-requests': 'Too many tries.',
  unavailable: 'The service does not answer just now.',
  'unsupported-media': 'This kind of content is not taken.',
  'version-conflict': 'Somebody else changed it meanwhile.',
  'writer-changed': 'The attempt goes on elsewhere.',
};

/** Answers a call that no route took. */
export const noSuchRoute: RequestHandler = (req) => {
  throw new AppError('not-found', {detail: `There is no ${req.method} ${req.originalUrl}.`});
};

/** The last handler: turns whatever was thrown into a problem. */
export const answerProblem: ErrorRequestHandler = (thrown: unknown, req, res, next) => {
  const refusal = refusalOf(thrown);
  if (refusal.code === 'internal' || refusal.code === 'unavailable') {
    req.log.error({err: thrown}, 'call failed');
  }
  if (res.headersSent) {
    next(); // Express cuts the connection: half an answer must not look like a whole one
    return;
  }
  const {code, details} = refusal;
  const status = PROBLEM_STATUS[code];
  const problem: Problem = {
    type: `${PROBLEM_TYPE_PREFIX}${code}`,
    code,
    title: TITLES[code],
    status,
    requestId: String(res.getHeader('Request-Id')),
    errors: [],
    ...details,
  };
  if (details.retryAfterS !== undefined)
    res.set('Retry-After', `${Math.ceil(details.retryAfterS)}`);
  res.status(status).type('application/problem+json').send(JSON.stringify(problem));
};

/** PostgreSQL is gone, restarting, or takes no more connections; SQLSTATE classes 08, 53, 57 and socket errors. */
const GONE = /^(08...|53300|57P0.|ECONNREFUSED|ECONNRESET|EPIPE|ETIMEDOUT)$/;

function refusalOf(thrown: unknown): AppError {
  if (thrown instanceof AppError) return thrown;
  const {code, message} = Object(thrown) as Record<string, unknown>;
  if (thrown instanceof URIError) {
    return new AppError('invalid-input', {errors: [{path: 'path', message: 'Not readable.'}]});
  }
  if (code === '22021' || code === '22P05') {
    // PostgreSQL's text holds every character but U+0000.
    return new AppError('invalid-input', {
      detail: 'There is a character in it that cannot be kept.',
    });
  }
  const isGone =
    (typeof code === 'string' && GONE.test(code)) ||
    (typeof message === 'string' &&
      /Connection terminated|timeout exceeded when trying to connect/.test(message));
  return isGone
    ? new AppError('unavailable', {detail: 'The database does not answer. Try again in a moment.'})
    : new AppError('internal');
}
