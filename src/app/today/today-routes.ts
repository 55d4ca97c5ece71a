import {type Routes} from '@angular/router';

export const TODAY_ROUTES: Routes = [
  {
    path: '',
    title: 'Today · Evenspan',
    loadComponent: () => import('./today-page').then((m) => m.TodayPage),
  },
];
