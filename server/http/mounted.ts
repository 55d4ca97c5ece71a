import {type RequestHandler, type Router} from 'express';
import {type Endpoint} from '#shared/endpoint';

const described = new WeakMap<RequestHandler, Endpoint>();

/** Remembers which endpoint a route's handler serves. */
export function remember(handler: RequestHandler, endpoint: Endpoint): RequestHandler {
  described.set(handler, endpoint);
  return handler;
}

/** One route of a router; `endpoint` is missing where somebody went around `mount`. */
export interface Mounted {
  readonly method: string;
  readonly path: string;
  readonly endpoint: Endpoint | undefined;
}

/** The routes a router really has, in the order it tries them. */
export function mountedOn(router: Router): Mounted[] {
  return router.stack.flatMap(({route}) =>
    route
      ? route.stack.map(({method, handle}) => ({
          method,
          path: route.path,
          endpoint: described.get(handle),
        }))
      : [],
  );
}
