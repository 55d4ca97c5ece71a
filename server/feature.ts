import {type Router} from 'express';
import {type ObjectLiteral} from 'typeorm';
import {type AppParts} from './app-parts';

/** One feature as it plugs into the server. */
export interface Feature {
  readonly entities?: readonly (new () => ObjectLiteral)[];
  /** Mounts its endpoints; also the place to say who may follow its event topics (`parts.events.allow`). */
  readonly mount?: (router: Router, parts: AppParts) => void;
}
