import connectPgSimple from 'connect-pg-simple';
import {type RequestHandler} from 'express';
import session from 'express-session';
import {Passport} from 'passport';
import {type AppParts} from '../app-parts';
import {type Caller} from '../caller';
import {poolOf} from '../db/pool';

/** A session ends after this long [ms]: of somebody signed in, and of a visitor, who only needs a token. */
export const SIGNED_IN_LASTS_MS = 14 * 24 * 3600 * 1000;
const VISIT_LASTS_MS = 24 * 3600 * 1000;
const SessionStore = connectPgSimple(session);

/** Middleware that finds out who calls: the session from its cookie, the caller from the database. */
export function sessions(
  {config, db, log}: AppParts,
  findCaller: (personId: string) => Promise<Caller | undefined>,
): RequestHandler[] {
  const store = new SessionStore({
    pool: poolOf(db),
    tableName: 'session',
    pruneSessionInterval: config.environment === 'test' ? false : 15 * 60,
    errorLog: (...words: unknown[]) => log.error({words}, 'session store'),
  });
  const passport = new Passport();
  passport.serializeUser((user, done) => done(null, user.personId));
  passport.deserializeUser((personId: string, done) => {
    // `false`: the session's person has left; the call goes on as nobody's.
    findCaller(personId).then((caller) => done(null, caller ?? false), done);
  });
  return [
    session({
      // `__Host-` binds the cookie to this very host; browsers take it with Secure only.
      name: config.isSecure ? '__Host-session' : 'evenspan-session',
      secret: config.sessionSecret,
      store,
      resave: false,
      saveUninitialized: false,
      rolling: false,
      proxy: config.isSecure,
      cookie: {
        httpOnly: true,
        sameSite: 'lax',
        secure: config.isSecure,
        path: '/',
        maxAge: VISIT_LASTS_MS,
      },
    }),
    passport.session() as RequestHandler,
  ];
}
