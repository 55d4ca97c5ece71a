import {type Request, type RequestHandler, type Response, type Router} from 'express';
import type * as z from 'zod';
import {
  type DownloadEndpoint,
  type Endpoint,
  type EventsEndpoint,
  type JsonEndpoint,
  type UploadEndpoint,
} from '#shared/endpoint';
import {type Caller} from '../caller';
import {InvalidInputError, ReplyMismatchError} from '../errors';
import {readFile, readJson, type UploadedFile} from './body';
import {type Download, sendDownload} from './download';
import {EventStream} from './event-stream';
import {checkForgery} from './forgery';
import {checkAccess, callerOf} from './access';
import {remember} from './mounted';

/** What a public endpoint gets instead of a caller. */
export interface Visit {
  readonly caller: Caller | undefined;
  readonly req: Request;
  readonly res: Response;
}

/** Serves one endpoint: who may call, whether our own page sends it, then what comes in and what goes out is checked. */
export function mount<I extends z.ZodType, R extends z.ZodType>(
  router: Router,
  endpoint: JsonEndpoint<I, R>,
  handler: (input: z.output<I>, caller: Caller) => Promise<z.input<R>>,
): void;
export function mount<I extends z.ZodType, R extends z.ZodType>(
  router: Router,
  endpoint: UploadEndpoint<I, R>,
  handler: (input: z.output<I>, caller: Caller, file: UploadedFile) => Promise<z.input<R>>,
): void;
export function mount<I extends z.ZodType>(
  router: Router,
  endpoint: DownloadEndpoint<I>,
  handler: (input: z.output<I>, caller: Caller) => Promise<Download>,
): void;
export function mount<I extends z.ZodType>(
  router: Router,
  endpoint: EventsEndpoint<I>,
  handler: (input: z.output<I>, caller: Caller, stream: EventStream) => Promise<void>,
): void;
export function mount(
  router: Router,
  endpoint: Endpoint,
  handler: (input: never, caller: Caller, extra: never) => Promise<unknown>,
): void {
  if (endpoint.access === 'public') throw new Error(`${endpoint.path} is public: use mountPublic`);
  const run = handler as (input: unknown, caller: Caller, extra?: unknown) => Promise<unknown>;
  register(router, endpoint, async (req, res) => {
    const caller = checkAccess(req, res, endpoint.access);
    await serve(endpoint, req, res, (input, extra) => run(input, caller, extra));
  });
}

/** Serves an endpoint that anybody may call. */
export function mountPublic<I extends z.ZodType, R extends z.ZodType>(
  router: Router,
  endpoint: JsonEndpoint<I, R>,
  handler: (input: z.output<I>, visit: Visit) => Promise<z.input<R>>,
): void {
  if (endpoint.access !== 'public') throw new Error(`${endpoint.path} is not public: use mount`);
  register(router, endpoint, async (req, res) => {
    const visit = {caller: callerOf(req), req, res};
    await serve(endpoint, req, res, (input) => handler(input as z.output<I>, visit));
  });
}

function register(router: Router, endpoint: Endpoint, handler: RequestHandler): void {
  router[endpoint.method](endpoint.path, remember(handler, endpoint));
}

async function serve(
  endpoint: Endpoint,
  req: Request,
  res: Response,
  run: (input: unknown, extra?: unknown) => Promise<unknown>,
): Promise<void> {
  checkForgery(req, res);
  switch (endpoint.kind) {
    case 'json':
      await readJson(req, res);
      reply(endpoint, res, await run(parse(endpoint, req)));
      return;
    case 'upload': {
      const file = await readFile(req, res, endpoint.maxBytes);
      reply(endpoint, res, await run(parse(endpoint, req), file));
      return;
    }
    case 'download':
      sendDownload(res, endpoint.mediaType, (await run(parse(endpoint, req))) as Download);
      return;
    case 'events':
      await run(parse(endpoint, req), new EventStream(req, res));
  }
}

function parse({input}: Endpoint, req: Request): unknown {
  const sent = {params: req.params, query: req.query, body: req.body as unknown};
  const parsed = input.safeParse(sent);
  if (!parsed.success) throw new InvalidInputError(parsed.error, sent);
  return parsed.data;
}

function reply(endpoint: JsonEndpoint | UploadEndpoint, res: Response, answer: unknown): void {
  const checked = endpoint.reply.safeParse(answer);
  if (!checked.success) throw new ReplyMismatchError(endpoint.path, checked.error);
  res.json(checked.data);
}
