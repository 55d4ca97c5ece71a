import {randomUUID} from 'node:crypto';
import {type RequestHandler} from 'express';
import {type Logger} from 'pino';
import {pinoHttp} from 'pino-http';
import {describeError} from '../log';

/** Logs each call with an id, which is also told to the caller. */
export function logCalls(logger: Logger): RequestHandler {
  return pinoHttp({
    logger,
    wrapSerializers: false, // the logger's own, as they are
    genReqId: (req, res) => {
      const id = randomUUID();
      res.setHeader('Request-Id', id);
      return id;
    },
    serializers: {
      // No headers, and nothing behind the question mark: both may hold secrets.
      req: ({id, method, url}: {id: string; method: string; url: string}) => ({
        id,
        method,
        path: url.split('?')[0],
      }),
      res: ({statusCode}: {statusCode: number}) => ({statusCode}),
      err: describeError,
    },
    // What went wrong was logged where it was answered.
    customErrorObject: (req, res, error, {responseTime}: {responseTime?: number}) => ({
      res,
      responseTime,
    }),
  });
}
