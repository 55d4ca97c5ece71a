import {
  type Disturbance,
  type LineCommand,
  type LiveSettings,
  type Scenario,
} from '../scenario/scenario';
import {tickOf} from '../scenario/read-scenario';

/** Something due at a tick. */
export interface Due<T> {
  readonly tick: number;
  readonly what: T;
}

export type Change = {readonly set: LiveSettings} | {readonly disturb: Disturbance};

/** What a document does by itself, by tick; those of one tick in document order. */
export interface Schedule {
  readonly lines: readonly Due<LineCommand>[];
  readonly changes: readonly Due<Change>[];
}

export function scheduleOf(scenario: Scenario, sampleS: number): Schedule {
  const due = <T extends {readonly atS: number}>(list: readonly T[]): Due<T>[] =>
    list.map((what) => ({tick: tickOf(what.atS, sampleS), what})).sort((a, b) => a.tick - b.tick); // sort keeps the order of equals
  return {lines: due(scenario.line), changes: due(scenario.actions)};
}
