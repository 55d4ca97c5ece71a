import {type Request, type Response} from 'express';
import {type Access} from '#shared/endpoint';
import {may} from '#shared/permissions';
import {type Caller} from '../caller';
import {AppError} from '../errors';
import {renewToken} from './forgery';

/** Who is signed in, if anybody. */
export function callerOf(req: Request): Caller | undefined {
  return req.user;
}

/** The caller, or a refusal. */
export function checkAccess(req: Request, res: Response, access: Access): Caller {
  const caller = callerOf(req);
  if (!caller) {
    renewToken(req, res);
    throw new AppError('not-signed-in', {detail: 'Sign in first.'});
  }
  if (access !== 'public' && access !== 'signed-in' && !may(caller.role, access)) {
    throw new AppError('not-allowed', {detail: 'Your role may not do this.'});
  }
  return caller;
}
