import * as control from '../control/controller-state';
import {RANDOM_SIZE} from '../signal/random';
import {Fingerprint} from './hash';
import {WATCH_SIZE} from './watch';

/** Places in the one array that holds every number of a run, before the parts of controller and plant. */
export const PRINT = 0;
export const TICK = Fingerprint.size;
export const NEXT_LINE = TICK + 1;
export const NEXT_CHANGE = TICK + 2;
export const ENTRIES = TICK + 3; // entries stamped so far
export const SAMPLE = TICK + 4; // last sample [N]
export const RANDOM = TICK + 5;
export const WATCH = RANDOM + RANDOM_SIZE;
export const CONTROLLER = WATCH + WATCH_SIZE;
export const PLANT = CONTROLLER + control.CONTROLLER_SIZE;
/** From here on the state goes into the fingerprint, up to the last number that the plant integrates. */
export const PRINTED = CONTROLLER + control.PRINTED;
