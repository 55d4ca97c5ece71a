import {inject} from '@angular/core';
import {type CanActivateFn, Router} from '@angular/router';
import {type Permission} from '#shared/permissions';
import {Session} from './session';

/** Lets people in who are signed in; the others come back here after sign-in. */
export const signedIn: CanActivateFn = (_route, target) =>
  inject(Session).me() !== null ||
  inject(Router).createUrlTree(['/sign-in'], {queryParams: {then: target.url}});

/** Lets people in who hold a permission; the others land on Today. */
export function holding(permission: Permission): CanActivateFn {
  return () => inject(Session).may(permission) || inject(Router).createUrlTree(['/today']);
}
