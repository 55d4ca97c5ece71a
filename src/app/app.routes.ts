import {type Routes} from '@angular/router';
import {holding, signedIn} from './session/session-guard';

/** One line per feature, in alphabetical order; each feature brings its own routes. */
export const routes: Routes = [
  {path: '', pathMatch: 'full', redirectTo: 'today'},
  {
    path: 'sign-in',
    title: 'Sign in · Evenspan',
    loadComponent: () => import('./session/sign-in-page').then((m) => m.SignInPage),
  },
  {
    path: '',
    canActivate: [signedIn],
    children: [
      {
        path: 'account',
        loadChildren: () => import('./account/account-routes').then((m) => m.ACCOUNT_ROUTES),
      },
      {
        path: 'attempts',
        canActivate: [holding('attempts:read-others')],
        loadChildren: () => import('./attempts/attempts-routes').then((m) => m.ATTEMPTS_ROUTES),
      },
      {
        path: 'bench',
        loadChildren: () => import('./bench/bench-routes').then((m) => m.BENCH_ROUTES),
      },
      {
        path: 'exercises',
        loadChildren: () => import('./exercises/exercises-routes').then((m) => m.EXERCISES_ROUTES),
      },
      {
        path: 'today',
        loadChildren: () => import('./today/today-routes').then((m) => m.TODAY_ROUTES),
      },
    ],
  },
  {
    path: '**',
    title: 'Not found · Evenspan',
    loadComponent: () => import('./ui/not-found-page').then((m) => m.NotFoundPage),
  },
];
