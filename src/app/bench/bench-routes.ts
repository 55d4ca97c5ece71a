import {type Routes} from '@angular/router';

export const BENCH_ROUTES: Routes = [
  {
    path: '',
    title: 'Bench · Evenspan',
    loadComponent: () => import('./bench-page').then((m) => m.BenchPage),
  },
];
