import {CreatePeople1764500000000} from './1764500000000-create-people';

/** In the order they run: one line each, the newest last. */
export const MIGRATIONS = [CreatePeople1764500000000];
