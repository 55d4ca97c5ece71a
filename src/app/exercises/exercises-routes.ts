import {type Routes} from '@angular/router';

export const EXERCISES_ROUTES: Routes = [
  {
    path: '',
    title: 'Exercises · Evenspan',
    loadComponent: () => import('./library/library-page').then((m) => m.LibraryPage),
  },
  {
    path: ':exerciseId',
    title: 'Exercise · Evenspan',
    loadComponent: () => import('./library/exercise-page').then((m) => m.ExercisePage),
  },
  {
    path: ':exerciseId/attempts/:attemptId',
    title: 'Attempt · Evenspan',
    loadComponent: () => import('./attempt/attempt-page').then((m) => m.AttemptPage),
  },
  {
    path: ':exerciseId/attempts/:attemptId/result',
    title: 'Result · Evenspan',
    loadComponent: () => import('./result/result-page').then((m) => m.ResultPage),
  },
];
