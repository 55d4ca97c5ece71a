import {type Router} from 'express';
import {type AppParts} from './app-parts';
import {attemptsFeature} from './features/attempts/attempts-feature';
import {eventsFeature} from './features/events/events-feature';
import {exercisesFeature} from './features/exercises/exercises-feature';
import {healthFeature} from './features/health/health-feature';
import {openapiFeature} from './features/openapi/openapi-feature';
import {peopleFeature} from './features/people/people-feature';
import {sessionFeature} from './features/session/session-feature';
import {type Feature} from './feature';

/** What the server can do: one line per feature, in alphabetical order. */
export const FEATURES: readonly Feature[] = [
  attemptsFeature,
  eventsFeature,
  exercisesFeature,
  healthFeature,
  openapiFeature,
  peopleFeature,
  sessionFeature,
];

/** Every entity of every feature. */
export const ENTITIES = FEATURES.flatMap(({entities}) => entities ?? []);

/** Mounts every endpoint of every feature. */
export function mountFeatures(router: Router, parts: AppParts): void {
  for (const feature of FEATURES) feature.mount?.(router, parts);
}
