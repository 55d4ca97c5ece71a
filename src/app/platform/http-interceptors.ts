import {HttpErrorResponse, type HttpInterceptorFn, HttpResponse} from '@angular/common/http';
import {inject} from '@angular/core';
import {catchError, from, switchMap, tap, throwError} from 'rxjs';
import {BuildCheck} from './build-check';
import {SignInAgain} from './sign-in-again';

/** Reads the token anew at each try: sign-in changes it while calls wait. */
export const forgeryToken: HttpInterceptorFn = (request, next) => {
  if (request.method === 'GET') return next(request);
  const token = /(?:^|;\s*)XSRF-TOKEN=([^;]*)/.exec(document.cookie)?.[1];
  return next(
    token === undefined
      ? request
      : request.clone({setHeaders: {'X-XSRF-TOKEN': decodeURIComponent(token)}}),
  );
};

/** A session that ran out asks for sign-in over the screen and then makes the call again. Must stand before `forgeryToken`. */
export const signInAgain: HttpInterceptorFn = (request, next) => {
  const again = inject(SignInAgain);
  return next(request).pipe(
    catchError((error: unknown) => {
      const isOver = error instanceof HttpErrorResponse && error.status === 401;
      if (!isOver || request.url.startsWith('/api/session')) return throwError(() => error);
      return from(again.ask()).pipe(
        switchMap((isSignedIn) => (isSignedIn ? next(request) : throwError(() => error))),
      );
    }),
  );
};

/** Notes which build of the product the server runs. */
export const buildHeader: HttpInterceptorFn = (request, next) => {
  const check = inject(BuildCheck);
  return next(request).pipe(
    tap((event) => {
      if (event instanceof HttpResponse) check.note(event.headers.get('Evenspan-Build'));
    }),
  );
};
