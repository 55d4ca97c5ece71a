import compression from 'compression';
import express, {
  type Express,
  type Request,
  type RequestHandler,
  type Response,
  Router,
} from 'express';
import {type AppParts} from './app-parts';
import {PeopleService} from './features/people/people-service';
import {mountFeatures} from './features';
import {logCalls} from './http/log-calls';
import {answerProblem, noSuchRoute} from './http/problem';
import {securityHeaders} from './http/security-headers';
import {sessions} from './http/session';
import {serveClient} from './http/client';

export interface App {
  readonly express: Express;
  /** Everything below `/api`. */
  readonly api: Router;
}

/** Builds the server from its parts; opens nothing. */
export function makeApp(parts: AppParts): App {
  const {config, db, log} = parts;
  const people = new PeopleService(db);
  const api = Router({caseSensitive: true});
  mountFeatures(api, parts);

  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', config.trustedProxies);
  app.set('query parser', 'simple');
  app.use(logCalls(log));
  app.use(securityHeaders(config));
  app.use(compression({filter: isCompressible}));
  app.use('/api', neverStored);
  // Health must answer while the database, and so every session, does not.
  app.use(/^\/api(?!\/health)/, ...sessions(parts, (id) => people.findCaller(id)));
  app.use('/api', api, noSuchRoute);
  app.use(serveClient(config.clientFolder));
  app.use(answerProblem);
  return {express: app, api};
}

/** Answers belong to one person at one time. */
const neverStored: RequestHandler = (req, res, next) => {
  res.set('Cache-Control', 'no-store');
  next();
};

/** Events must reach the reader one by one, not when a block is full. */
function isCompressible(req: Request, res: Response): boolean {
  const type = res.getHeader('Content-Type');
  return !String(type).startsWith('text/event-stream') && compression.filter(req, res);
}
