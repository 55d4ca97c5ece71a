import {type Routes} from '@angular/router';

export const EXERCISES_ROUTES: Routes = [];
