import {
  dampingOfDecayRatio,
  decayRatioOfDamping,
  firstOrderLag,
  gainPerPct,
  integrator,
  overshootOfDamping,
} from '../analysis/index';
import {brakeMovement} from '../measures/output';
import {overshootPct} from '../measures/step';
import {aTrace} from '../test-support/a-trace';
import {type PidLoop, runLoop} from '../test-support/a-pid';
import {integralOf, peaksOf} from '../test-support/curves';
import {plainRefA} from '../test-support/ref-a';
import {record} from '../test-support/record';
import {near, within} from '../test-support/within';

const SAMPLE_S = 0.005; // of loops that the handbook reckons without sampling
const FOPDT = {process: firstOrderLag(1, 10), deadTimeS: 2, gain: 2.5, tiS: 10};
const IPDT = {process: integrator(1), deadTimeS: 1, gain: 0.5, tiS: 8};

/** The engine's PI in a loop, measured with the engine's measures where it has them. */
function measured(loop: Omit<PidLoop, 'sampleS'>) {
  const {y, u} = runLoop({...loop, sampleS: SAMPLE_S});
  const errors = y.map((value) => (loop.setPoint ?? 0) - value);
  const rows = aTrace(y.length, {tensionN: (row) => y[row]!, outputPct: (row) => u[row]!});
  const whole = {from: 0, to: y.length};
  const highest = peaksOf(y).reduce((high, peak) => (peak.value > high.value ? peak : high));
  return {
    overshootPct: overshootPct(rows, whole, {fromN: 0, toN: 1})?.value ?? 0,
    movement: brakeMovement(rows, whole, SAMPLE_S)!.value * (y.length - 1) * SAMPLE_S,
    peak: highest.value,
    peakS: (highest.at - 1) * SAMPLE_S, // row 0 is from before the step
    errorIntegral: integralOf(errors.slice(1), SAMPLE_S),
    absoluteIntegral: integralOf(errors.slice(1).map(Math.abs), SAMPLE_S),
  };
}

// Numbers of table M of the project's handbook. A: closed form; P, O: Python and Octave, without sampling.
describe('the engine’s PI on a lag with dead time', () => {
  it('leaves an error integral of Ti/Kc = 4.000 after a load step (handbook M 69; A, P)', () => {
    expect(-measured({...FOPDT, load: 1, lengthS: 120}).errorIntegral).toEqual(within(4, 1e-3));
  });

  it('answers a set-point step: 4.06 %, IAE 4.338, TV 5.16, peak at 9.48 s (handbook M 70; P, O)', () => {
    const step = measured({...FOPDT, setPoint: 1, lengthS: 100});

    expect(step.overshootPct).toEqual(within(4.06, 0.01));
    expect(step.absoluteIntegral).toEqual(within(4.338, 0.01));
    expect(step.movement).toEqual(within(5.16, 0.01));
    expect(step.peakS).toEqual(within(9.48, 0.01));
  });
});

describe('the engine’s PI on an integrator with dead time', () => {
  it('answers a set-point step: 27.76 %, IAE 3.923 (handbook M 71; P, O)', () => {
    const step = measured({...IPDT, setPoint: 1, lengthS: 100});

    expect(step.overshootPct).toEqual(within(27.76, 0.01));
    expect(step.absoluteIntegral).toEqual(within(3.923, 0.01));
  });

  it('answers a load step: peak 1.962, IAE 16.00 (handbook M 71; P, O)', () => {
    const load = measured({...IPDT, load: 1, lengthS: 150});

    expect(load.peak).toEqual(within(1.962, 0.01));
    expect(load.absoluteIntegral).toEqual(within(16, 0.01));
  });
});

describe('a second-order system', () => {
  for (const [damping, expected] of [
    [0.5, 16.3],
    [0.7071, 4.32],
    [0.2, 52.66],
  ] as const)
    it(`overshoots by ${expected} % at ζ ${damping} (handbook M 72; A)`, () => {
      expect(overshootOfDamping(damping)).toEqual(near(expected, 0.01));
    });

  it('decays to a quarter at ζ 0.21545, 50 % overshoot (handbook M 73; A)', () => {
    expect(dampingOfDecayRatio(0.25)).toEqual(near(0.21545, 1e-4));
    expect(decayRatioOfDamping(0.21545)).toEqual(near(0.25, 1e-4));
    expect(overshootOfDamping(dampingOfDecayRatio(0.25))).toEqual(near(50, 1e-4));
  });
});

describe('the loop on a ramp', () => {
  it('leaves an error integral of 5.472 N·s (handbook M 79; A, E-9)', () => {
    const rangeN = 500;
    const ramp = {atS: 20, command: 'run', speedMps: 7, rampS: 10} as const;
    const {column, at} = record(
      plainRefA({
        roll: {radiusM: 0.25},
        brake: {lagS: 0.1, deadTimeS: 0.03},
        sensing: {rangeN, filterS: 0.05},
        controller: {
          sampleS: 0.01,
          mode: 'automatic',
          kp: gainPerPct(0.07362, rangeN),
          tiS: 0.095,
          standstillPct: 20,
        },
        line: [{atS: 0, command: 'run', speedMps: 2, rampS: 10}, ramp],
      }),
      29,
    );
    const errors = column('tensionN')
      .slice(2000, 2901)
      .map((tension) => tension - 200);

    expect(at(20, 'tensionN')).toEqual(near(200, 0.01));
    expect(integralOf(errors, 0.01)).toEqual(within(5.472, 0.01));
  });
});
