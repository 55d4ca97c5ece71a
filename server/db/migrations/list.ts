import {CreatePeople1764500000000} from './1764500000000-create-people';
import {CreateExercises1764510000000} from './1764510000000-create-exercises';
import {CreateAttempts1764520000000} from './1764520000000-create-attempts';

/** In the order they run: one line each, the newest last. */
export const MIGRATIONS = [
  CreatePeople1764500000000,
  CreateExercises1764510000000,
  CreateAttempts1764520000000,
];
