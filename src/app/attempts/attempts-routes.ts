import {type Routes} from '@angular/router';

export const ATTEMPTS_ROUTES: Routes = [
  {
    path: '',
    title: 'Attempts · Evenspan',
    loadComponent: () => import('./attempts-page').then((m) => m.AttemptsPage),
  },
];
