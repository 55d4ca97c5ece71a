import {type DestinationStream, type Logger, pino} from 'pino';

const SECRETS = ['cookie', 'authorization', 'password', 'passwordHash', 'token', 'secret'];

/** The process's log: JSON lines on standard output, without secrets. */
export function makeLog(level: string, to?: DestinationStream): Logger {
  const options = {
    level,
    redact: {
      paths: SECRETS.flatMap((name) => [name, `*.${name}`, `*.*.${name}`]),
      censor: '[left out]',
    },
    serializers: {err: describeError},
  };
  return to ? pino(options, to) : pino(options);
}

/** An error as it is logged: no parameters of queries, no rows named by the database, which hold what people typed. */
export function describeError(error: unknown): unknown {
  if (!(error instanceof Error)) return {message: String(error)};
  const {code, constraint, query} = error as {
    code?: unknown;
    constraint?: unknown;
    query?: unknown;
  } & Error;
  return {
    type: error.name,
    message: error.message,
    stack: error.stack,
    ...(code !== undefined && {code}),
    ...(constraint !== undefined && {constraint}),
    ...(query !== undefined && {query}),
    ...(error.cause instanceof Error && {cause: describeError(error.cause)}),
  };
}
