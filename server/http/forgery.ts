import {randomBytes, timingSafeEqual} from 'node:crypto';
import {type CookieOptions, type Request, type Response} from 'express';
import {AppError} from '../errors';

export const TOKEN_COOKIE = 'XSRF-TOKEN';
export const TOKEN_HEADER = 'X-XSRF-TOKEN';
const READING = new Set(['GET', 'HEAD', 'OPTIONS']);

/** Gives the session a token, if it has none, and tells our own page by a cookie that only it can read. */
export function giveToken(req: Request, res: Response): void {
  req.session.forgeryToken ??= randomBytes(32).toString('base64url');
  const options: CookieOptions = {
    path: '/',
    sameSite: 'lax',
    secure: req.session.cookie.secure === true,
  };
  res.cookie(TOKEN_COOKIE, req.session.forgeryToken, options);
}

/** A page whose session has ended still holds its token; it gets a new one, since its next call is the sign-in. */
export function renewToken(req: Request, res: Response): void {
  if (req.headers.cookie?.includes(`${TOKEN_COOKIE}=`)) giveToken(req, res);
}

/** Refuses a writing call that does not carry the session's token: another site's page cannot know it. */
export function checkForgery(req: Request, res: Response): void {
  if (READING.has(req.method)) return;
  const wanted = req.session.forgeryToken;
  const sent = req.get(TOKEN_HEADER);
  if (wanted !== undefined && sent !== undefined && isSame(wanted, sent)) return;
  giveToken(req, res); // our own page may simply hold the token of a session that ended
  throw new AppError('forged-request', {
    detail: 'The call did not carry the token of this session. Read /api/session and try again.',
  });
}

function isSame(wanted: string, sent: string): boolean {
  const [a, b] = [Buffer.from(wanted), Buffer.from(sent)];
  return a.length === b.length && timingSafeEqual(a, b);
}
