import {type Routes} from '@angular/router';

export const BENCH_ROUTES: Routes = [];
