import {type Routes} from '@angular/router';

export const ACCOUNT_ROUTES: Routes = [
  {
    path: '',
    title: 'Account · Evenspan',
    loadComponent: () => import('./account-page').then((m) => m.AccountPage),
  },
];
