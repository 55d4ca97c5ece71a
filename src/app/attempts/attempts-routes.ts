import {type Routes} from '@angular/router';

export const ATTEMPTS_ROUTES: Routes = [];
