import {leastViscousNmS} from '../analysis/index';
import * as place from '../plant/plant-state';
import {aPlant, linearised} from '../test-support/a-plant';
import {plainRefA, refA, withHeldRadius} from '../test-support/ref-a';
import {record} from '../test-support/record';
import {near, within} from '../test-support/within';

const STAND_S = 1e-9;

// Numbers of table M of the project's handbook; A: closed form.
describe('the brake', () => {
  for (const radiusM of [0.5, 0.25, 0.1, 0.06])
    it(`takes 400 W at R ${radiusM} m, 200 N, 2 m/s (handbook M 29; A, C-8)`, () => {
      // wound and run at the same tension; a brake at ambient gives nothing off: C·dϑ/dt is what it takes
      const scenario = plainRefA({roll: {radiusM, woundTensionN: 200}});
      const {y, torqueNm, slopes} = aPlant(scenario, {tensionN: 200, lineMps: 2});

      expect(slopes(y, torqueNm).slope[place.HEAT]! * 5000).toBeCloseTo(400, 9);
    });

  it('warms by 33.04 K in 600 s of 400 W (handbook M 30; A, C-9)', () => {
    const scenario = plainRefA({
      roll: {woundTensionN: 200},
      plantStepS: 0.005,
      controller: {sampleS: 0.1},
      line: [{atS: 0, command: 'run', speedMps: 2, rampS: 0.1}],
    });

    // it begins with a start of 0.1 s, hence 1e-3 and not less
    expect(record(scenario, 600).at(600, 'brakeC') - 25).toEqual(within(33.04, 1e-3));
  });

  it('goes to 60 K in 750 s time constant at 400 W (handbook M 30; A, C-10)', () => {
    const {y, torqueNm, slopes} = aPlant(plainRefA({roll: {woundTensionN: 200}}), {
      tensionN: 200,
      lineMps: 2,
    });
    const heatSlope = (riseK: number): number => {
      const moved = y.slice();
      moved[place.HEAT] = 25 + riseK;
      return slopes(moved, torqueNm).slope[place.HEAT]!;
    };

    expect(60 + heatSlope(60) * 750).toEqual(within(60, 1e-3));
    expect(heatSlope(60)).toBeCloseTo(0, 9);
    expect(50 / (heatSlope(0) - heatSlope(50))).toEqual(within(750, 1e-3));
  });

  for (const [radiusM, expected] of [
    [0.06, 61.1],
    [0.5, 4.4],
  ] as const)
    it(`can't go below ${expected} N at R ${radiusM} m (handbook M 31; A, C-2)`, () => {
      const scenario = withHeldRadius(
        refA({roll: {radiusM}, controller: {mode: 'manual', manualPct: 0}}),
      );

      expect(record(scenario, 30).at(30, 'tensionN')).toEqual(within(expected, 1e-3));
    });

  it('swings up below −328.9 N·m·s of negative damping (handbook M 32; A, C-7)', () => {
    // C-7 leaves strain out: 2 N here. The document refuses negative drag, the equations don't.
    const growth = (viscousNmS: number): number => {
      const {a} = linearised(aPlant(plainRefA({roll: {viscousNmS}}), {tensionN: 2, lineMps: 2}));
      return a[0]![0]! + a[2]![2]!; // trace over ω and ℓ: twice the real part of the mode
    };
    const slope = (growth(0) - growth(-300)) / 300;
    const limit = -growth(0) / slope;

    expect(limit).toEqual(within(-328.9, 5e-3));
    expect(growth(1.005 * -328.9)).toBeGreaterThan(0);
    expect(growth(0.995 * -328.9)).toBeLessThan(0);
    const point = {
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
    expect(leastViscousNmS(point)).toEqual(within(-328.9, 5e-3));
  });

  it('lags: after one tick of 10 ms a lag of 0.1 s keeps 0.904837 (handbook M 81; A)', () => {
    const scenario = refA({
      brake: {lagS: 0.1, deadTimeS: 0, residualTorqueNm: 0},
      controller: {mode: 'manual', manualPct: 60, standstillPct: 40},
      line: [],
    });
    const {at} = record(scenario, 0.02);

    expect(at(0, 'torqueNm')).toEqual(near(100, STAND_S));
    expect((150 - at(0.01, 'torqueNm')) / 50).toEqual(near(0.904837, 1e-6));
  });
});
