import {type Request} from 'express';
import {type Caller} from '../../caller';
import {SIGNED_IN_LASTS_MS} from '../../http/session';

/** Signs in under a new session: whoever knew the old one knows nothing of this one. */
export function beginSession(req: Request, caller: Caller): Promise<void> {
  return new Promise((resolve, reject) => {
    // Passport regenerates the session.
    req.logIn(caller, (error?: Error) => {
      if (error) {
        reject(error);
        return;
      }
      req.session.cookie.maxAge = SIGNED_IN_LASTS_MS;
      resolve();
    });
  });
}

/** Signs out and goes on under a new, empty session. */
export function endSession(req: Request): Promise<void> {
  return new Promise((resolve, reject) => {
    req.logOut((error?: Error) => (error ? reject(error) : resolve()));
  });
}
