import type * as z from 'zod';
import {type Permission} from './permissions';

/** Who may call: anybody, anybody signed in, or who holds a permission. */
export type Access = 'public' | 'signed-in' | Permission;

interface Described {
  /** Path below `/api`, parameters as `:name`. */
  readonly path: `/${string}`;
  readonly access: Access;
  /** One sentence for the API's description. */
  readonly summary: string;
}

/** JSON in, JSON out. `input` is an object of `params`, `query` and `body`, whichever there are. */
export interface JsonEndpoint<
  I extends z.ZodType = z.ZodType,
  R extends z.ZodType = z.ZodType,
> extends Described {
  readonly kind: 'json';
  readonly method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  readonly input: I;
  readonly reply: R;
}

/** Multipart in, JSON out; one file in the field `file`. */
export interface UploadEndpoint<
  I extends z.ZodType = z.ZodType,
  R extends z.ZodType = z.ZodType,
> extends Described {
  readonly kind: 'upload';
  readonly method: 'post' | 'put';
  readonly input: I;
  readonly reply: R;
  /** Largest file [B]. */
  readonly maxBytes: number;
}

/** A file out. The handler names it. */
export interface DownloadEndpoint<I extends z.ZodType = z.ZodType> extends Described {
  readonly kind: 'download';
  readonly method: 'get';
  readonly input: I;
  readonly mediaType: string;
}

/** Server-sent events out: nudges, on which the client reads again. */
export interface EventsEndpoint<I extends z.ZodType = z.ZodType> extends Described {
  readonly kind: 'events';
  readonly method: 'get';
  readonly input: I;
}

export type Endpoint = JsonEndpoint | UploadEndpoint | DownloadEndpoint | EventsEndpoint;

/** Describes one HTTP call once, for the server that mounts it and the client that makes it. */
export function endpoint<I extends z.ZodType, R extends z.ZodType>(
  described: JsonEndpoint<I, R>,
): JsonEndpoint<I, R>;
export function endpoint<I extends z.ZodType, R extends z.ZodType>(
  described: UploadEndpoint<I, R>,
): UploadEndpoint<I, R>;
export function endpoint<I extends z.ZodType>(described: DownloadEndpoint<I>): DownloadEndpoint<I>;
export function endpoint<I extends z.ZodType>(described: EventsEndpoint<I>): EventsEndpoint<I>;
export function endpoint(described: Endpoint): Endpoint {
  return described;
}
