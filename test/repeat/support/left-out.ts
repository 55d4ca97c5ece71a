import {type Field} from '#sim-core/index';

// What the random documents and sessions leave out, as the engine does not do it well yet (found by them; each
// with the smallest document that shows it). PLAIN is FILM of stands.ts.
//
// −0    It is allowed wherever 0 is, but JSON makes 0 of it and the fingerprint tells the two apart: PLAIN with
//       `roll.ovalM: -0`, or the act {disturb: {zeroN: -0}}, run to another hash once they have been sent.
// tiS   PLAIN with `controller.tiS: 5e-324` (or 1e-310, in the document or in a `set`) diverges: sampleS/tiS is
//       infinite.
// creep PLAIN with `initialTensionN: 0` and `line: [{atS: 0.5, command: 'run', speedMps: 1e-9, rampS: 0.3}]` takes
//       some 100 ms for each tick: a web that is just loose on a line that hardly moves halves every step down to
//       the last.

/** Slowest line that is tried [m/s]. */
const SLOWEST_MPS = 0.001;

/** The value, or 0 for a speed at which the line creeps. */
export function withoutCreeping({path}: Field, value: unknown): unknown {
  const creeps = path === 'speedMps' && typeof value === 'number' && value > 0;
  return creeps && value < SLOWEST_MPS ? 0 : value;
}
