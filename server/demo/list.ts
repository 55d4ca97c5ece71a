import {attemptsDemo} from './attempts';
import {type DemoStep} from './demo-step';
import {exercisesDemo} from './exercises';
import {peopleDemo} from './people';

/** What the demo consists of: one line per feature, in alphabetical order; who needs whom, the steps say. */
export const DEMO: readonly DemoStep[] = [attemptsDemo, exercisesDemo, peopleDemo];
