import {type Field} from '#sim-core/index';

// What the engine does not do well yet, as these tests and longer searches with their generators found; each with
// the smallest document that shows it. Names in capitals are stands of stands.ts. The first three are left out of
// what is drawn at random; the others do not come up among the seeds in use.
//
// −0      It is allowed wherever 0 is, but JSON makes 0 of it and the fingerprint tells the two apart: FILM with
//         `roll.ovalM: -0`, or the act {disturb: {zeroN: -0}}, run to another hash once they have been sent.
// tiS     FILM with `controller.tiS: 5e-324` (or 1e-310, also in a `set`) diverges: sampleS/tiS is infinite.
// creep   FILM with `initialTensionN: 0`, `line: [{atS: 0.2, command: 'run', speedMps: 1e-9, rampS: 1}]` takes some
//         30 … 450 ms a tick: a web that is just loose on a line that hardly moves halves every step to the last.
//         So does DANCER with `initialTensionN: 0`, `controller.setPointN: 1e-9`, `line: []`.
// windup  FILM with `controller.kp: 2` and {atS: 3, set: {antiWindup: 'backCalculation', trackingS: 0.001}} diverges
//         at tick 622: sampleS/trackingS above 2 makes the integral part grow up to tenfold a tick, to infinity.
// empty   FILM with web {thicknessM: 0.05, densityKgM3: 1, breakNPerM: 1e7}, roll {coreRadiusM: 0.005, radiusM: 5}, a
//         run to 50 m/s in 0 s at 0.1 s and {atS: 1.72, disturb: {radiusM: 0.00501}} diverges where the roll is empty:
//         within one step the wound length falls so far below 0 that the radius is the root of a negative number.
// start   FOIL with `initialTensionN: 0` and a run to 2 m/s in 60 s has single ticks of 200 ms while it begins.

/** Slowest line that is tried [m/s]. */
const SLOWEST_MPS = 0.001;

/** The value, or 0 for a speed at which the line creeps. */
export function withoutCreeping({path}: Field, value: unknown): unknown {
  const creeps = path === 'speedMps' && typeof value === 'number' && value > 0;
  return creeps && value < SLOWEST_MPS ? 0 : value;
}
