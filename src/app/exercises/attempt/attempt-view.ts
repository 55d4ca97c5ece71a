import {type Outcome} from '#sim-core/index';
import {type ExerciseToRun} from '#shared/exercises/exercise';
import {type UnitSystem, written} from '#shared/units';
import {type AllowedSettings} from '../../live-run/settings-panel/settings-panel';

/** Minutes and seconds left of the time limit: "4:07". */
export function timeLeft(limitS: number, runS: number): string {
  const leftS = Math.max(0, Math.ceil(limitS - runS));
  return `${Math.floor(leftS / 60)}:${String(leftS % 60).padStart(2, '0')}`;
}

/** Settings that may be touched, with their ranges. */
export function allowedSettings({touch}: ExerciseToRun): AllowedSettings {
  return Object.fromEntries(
    touch.settings.map(({key, lowest, highest}) => [key, {lowest, highest}]),
  );
}

/** Tolerance around the target [N]. */
export function bandOf({target}: Pick<ExerciseToRun, 'target'>) {
  const {tensionN, toleranceN} = target;
  return {lowest: tensionN - toleranceN, highest: tensionN + toleranceN};
}

/** Why the run is over, as a sentence; empty while it goes on. */
export function endingOf(outcome: Outcome, isTimeUp: boolean, units: UnitSystem): string {
  if (outcome.kind === 'webBroke') {
    const reached = outcome.tensionN ?? NaN;
    return `The web broke at ${outcome.atS.toFixed(1)} s, at ${written('tension', reached, units)}. Hand in what you have.`;
  }
  if (outcome.kind !== 'running') return 'The run is over. Hand in what you have.';
  return isTimeUp ? 'The time of this exercise is used up. Hand in what you have.' : '';
}

/** What of an attempt the server does not have yet. */
export function unsentWords(unsent: number): string {
  if (unsent === 0) return 'Everything is saved.';
  return `${unsent} ${unsent === 1 ? 'entry' : 'entries'} not sent yet, kept on this device.`;
}
