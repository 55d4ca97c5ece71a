import {unwindMode, type UnwindPoint} from '../analysis/index';
import {aPlant, linearised, type Linearised} from '../test-support/a-plant';
import {amplitudeOf, meanOf, peaksOf} from '../test-support/curves';
import {plainRefA} from '../test-support/ref-a';
import {record, type Recorded} from '../test-support/record';
import {near, within} from '../test-support/within';

/** Runs to this speed and has come to rest in it at SETTLED_S. */
const RUN = {atS: 0, command: 'run', speedMps: 2, rampS: 10} as const;
const SETTLED_S = 20;
const ROW_S = 0.001;
/** REF-A at the full roll as table M has it, at a tension whose strain is no matter. */
const FULL: UnwindPoint = {
  radiusM: 0.5,
  inertiaKgM2: 78.932,
  stiffnessN: 4e5,
  spanM: 2,
  lineMps: 2,
  tensionN: 2,
  woundTensionN: 0,
  lossTimeS: 0.005,
  viscousNmS: 0,
};

function tensions(recorded: Recorded, fromS: number, toS: number): number[] {
  return recorded.column('tensionN').slice(Math.round(fromS / ROW_S), Math.round(toS / ROW_S) + 1);
}

/** Natural frequency [rad/s] and damping ratio of roll and span, from the engine's own slopes. */
function modeOf({a}: Linearised): {naturalRadps: number; dampingFactor: number} {
  const naturalRadps = Math.sqrt(a[0]![0]! * a[2]![2]! - a[0]![2]! * a[2]![0]!);
  return {naturalRadps, dampingFactor: -(a[0]![0]! + a[2]![2]!) / (2 * naturalRadps)};
}

// Numbers of table M of the project's handbook. A: closed form; P, O: linear model in Python and in Octave;
// N: nonlinear simulation outside this project. The engine runs plainRefA: see there how its radius is held.
describe('roll and span', () => {
  it('swing at 25.169 rad/s with a damping of 0.08279 (handbook M 13; P, O, F-8)', () => {
    // F-8 leaves strain out: 2 N here; at 200 N the frequency is 0.05 % higher, see effectiveStiffnessN
    const mode = modeOf(linearised(aPlant(plainRefA(), {tensionN: 2, lineMps: 2})));

    expect(mode.naturalRadps).toEqual(within(25.169, 5e-4));
    expect(mode.dampingFactor).toEqual(within(0.08279, 5e-4));
    expect(unwindMode(FULL).naturalRadps).toEqual(within(25.169, 5e-4));
    expect(unwindMode(FULL).dampingFactor).toEqual(within(0.08279, 5e-4));
  });

  it('answer +10 N·m of brake: +20.00 N, peak 35.53 N at 0.1202 s, period 0.2504 s (handbook M 14; P, O, N)', () => {
    const actions = [{atS: SETTLED_S, set: {manualPct: 44}}];
    const recorded = record(plainRefA({line: [RUN], actions}), SETTLED_S + 15);
    const before = recorded.at(SETTLED_S, 'tensionN');
    const swing = tensions(recorded, SETTLED_S, SETTLED_S + 2).map((tension) => tension - before);
    const [first, second] = peaksOf(swing);

    expect(before).toEqual(near(200, 1e-3));
    expect(recorded.at(SETTLED_S + 15, 'tensionN') - before).toEqual(within(20, 3e-3));
    expect(first!.value).toEqual(within(35.53, 3e-3));
    expect(first!.at * ROW_S).toEqual(within(0.1202, 3e-3));
    expect((second!.at - first!.at) * ROW_S).toEqual(within(0.2504, 3e-3));
  });

  it('give 20 N per N·m at R 0.05 m, 19.998 with b 0.05 (handbook M 15; A, F-7)', () => {
    // 60 N: the brake has to have something to do beside the drag
    const gain = (viscousNmS: number): number => {
      const scenario = plainRefA({roll: {radiusM: 0.05, viscousNmS}});
      const {a, b, c} = linearised(aPlant(scenario, {tensionN: 60, lineMps: 2}));
      // −C·A⁻¹·B over ω and ℓ; C has nothing of ω but the web's loss
      const determinant = a[0]![0]! * a[2]![2]! - a[0]![2]! * a[2]![0]!;
      const omega = -a[2]![2]! * (b[0]![0]! / determinant);
      const length = a[2]![0]! * (b[0]![0]! / determinant);
      return c[0]![0]! * omega + c[0]![2]! * length;
    };

    expect(gain(0)).toEqual(within(20, 1e-6));
    expect(gain(0.05)).toEqual(within(19.998, 1e-5));
    const atCore = {...FULL, radiusM: 0.05, inertiaKgM2: 0.4};
    expect(unwindMode(atCore).gainNPerNm).toEqual(within(20, 1e-9));
    expect(unwindMode({...atCore, viscousNmS: 0.05}).gainNPerNm).toEqual(within(19.998, 1e-5));
  });

  it('are at 357.86 N while the line speeds up by 0.5 m/s² (handbook M 20; A; N 357.72)', () => {
    const faster = {atS: SETTLED_S, command: 'run', speedMps: 7, rampS: 10} as const;
    const recorded = record(plainRefA({line: [RUN, faster]}), SETTLED_S + 10);

    expect(meanOf(tensions(recorded, SETTLED_S + 5, SETTLED_S + 10))).toEqual(within(357.86, 2e-3));
  });

  it('are at 42.14 N while it slows down by 0.5 m/s², and slack at first (handbook M 21; A; N 42.06)', () => {
    const stop = {atS: SETTLED_S, command: 'stop', rampS: 4} as const;
    const recorded = record(plainRefA({line: [RUN, stop]}), SETTLED_S + 4);

    expect(Math.min(...tensions(recorded, SETTLED_S, SETTLED_S + 0.5))).toBe(0);
    // four whole periods of the swing before the ramp ends
    expect(meanOf(tensions(recorded, SETTLED_S + 3, SETTLED_S + 4))).toEqual(near(42.14, 0.3));
  });

  it('peak at 496 N in an abrupt start from rest at 190 N (handbook M 22; N)', () => {
    const line = [{atS: 0.5, command: 'run', speedMps: 2, rampS: 4}] as const;
    const recorded = record(plainRefA({initialTensionN: 190, line}), 4.5);

    expect(Math.max(...recorded.column('tensionN'))).toEqual(within(496, 0.02));
  });

  it('go slack beyond 0.6335 m/s² (handbook M 23; A)', () => {
    // a stop rounded over 4 s hardly swings (4 N), so that the mean tells: T = 200·(1 − a/limit)
    const stopAt = (mps2: number): Recorded => {
      const stop = {atS: SETTLED_S, command: 'stop', rampS: 5 / mps2} as const;
      const run = {...RUN, speedMps: 5};
      return record(plainRefA({lineRoundS: 4, line: [run, stop]}), SETTLED_S + 5 / mps2);
    };
    const gentle = stopAt(0.5);
    const mean = meanOf(tensions(gentle, SETTLED_S + 6, SETTLED_S + 10));

    expect(0.5 / (1 - mean / 200)).toEqual(within(0.6335, 1e-3));
    expect(Math.min(...gentle.column('tensionN'))).toBeGreaterThan(0);
    expect(Math.min(...stopAt(0.61).column('tensionN'))).toBeGreaterThan(0);
    expect(Math.min(...stopAt(0.66).column('tensionN'))).toBe(0);
  });

  for (const [number, mps2, simulated, formula] of [
    [24, 0.8, 0.716, 0.657],
    [25, 5 / 3, 1.992, 1.957],
  ] as const)
    it(`overrun by ${simulated} m at ${mps2.toFixed(4)} m/s² (handbook M ${number}; N; A, B-14)`, () => {
      const stop = {atS: SETTLED_S, command: 'stop', rampS: 2 / mps2} as const;
      const {column} = record(plainRefA({line: [RUN, stop]}), SETTLED_S + 5);

      expect(Math.max(...column('slackM'))).toEqual(within(simulated, 0.02));
      // B-14 on the engine's own roll: the surface slows by M·R/J
      const {inertiaKgM2} = aPlant(plainRefA(), {tensionN: 200, lineMps: 2});
      const runsOn = (2 * 2 * inertiaKgM2) / (2 * 100 * 0.5);
      expect(runsOn - (2 * 2) / (2 * mps2)).toEqual(near(formula, 1e-3));
    });

  it('keep their web with M + J·a/R during the stop (handbook M 26; N)', () => {
    const stop = {atS: SETTLED_S, command: 'stop', rampS: 2.5} as const;
    const {inertiaKgM2} = aPlant(plainRefA(), {tensionN: 200, lineMps: 2});
    const boostPct = (100 + (inertiaKgM2 * 0.8) / 0.5) / 2.5;
    const actions = [
      {atS: SETTLED_S, set: {manualPct: boostPct}},
      {atS: SETTLED_S + 2.5, set: {manualPct: 40}},
    ];
    const recorded = record(plainRefA({line: [RUN, stop], actions}), SETTLED_S + 5);
    const during = tensions(recorded, SETTLED_S, SETTLED_S + 5);

    expect(Math.max(...recorded.column('slackM'))).toBe(0);
    expect(Math.min(...during)).toBeGreaterThan(199.5);
    expect(Math.max(...during)).toBeLessThan(200.5);
  });

  for (const [speedMps, expected] of [
    [2, 5.2],
    [5, 37.3],
  ] as const)
    it(`ripple by ${expected} N at ${speedMps} m/s, 1 mm out of round (handbook M 37; P, E-5)`, () => {
      const line = [{...RUN, speedMps}];
      const recorded = record(plainRefA({line, roll: {eccentricityM: 0.001}}), 40);
      // four turns of 2π·R/v, to a row
      const fourTurnsS = (4 * 2 * Math.PI * 0.5) / speedMps;
      const rows = tensions(recorded, 40 - fourTurnsS, 40).slice(1);

      expect(amplitudeOf(rows, 4)).toEqual(within(expected, 0.01));
    });

  for (const [radiusM, expected] of [
    [0.5, 12.58],
    [0.1, 6.21],
    [0.06, 2.52],
  ] as const)
    it(`meet their resonance at ${expected} m/s with R ${radiusM} m (handbook M 38; A, E-7)`, () => {
      const stand = aPlant(plainRefA({roll: {radiusM}}), {tensionN: 2, lineMps: 2});

      expect(modeOf(linearised(stand)).naturalRadps * radiusM).toEqual(within(expected, 5e-3));
    });
});
