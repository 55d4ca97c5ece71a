import {Matrix} from 'ml-matrix';
import {aliasHz} from './alias';
import {stepResponse} from './linear/step-response';
import * as secondOrder from './second-order';

describe('the second-order system', () => {
  // columns of a table in the project's handbook, section G.6: overshoot %, decay ratio, ωn·t_peak, Mr
  for (const [damping, overshoot, decay, peakS, resonance] of [
    [0.1, 72.92, 0.5318, 3.157, 5.025],
    [0.2, 52.66, 0.2773, 3.206, 2.552],
    [0.4, 25.38, 0.0644, 3.428, 1.364],
    [0.6, 9.48, 0.009, 3.927, 1.042],
    [0.7071, 4.32, 0.0019, 4.443, 1],
  ] as const)
    it(`at ζ ${damping}`, () => {
      expect(secondOrder.overshootOfDamping(damping)).toBeCloseTo(overshoot, 2);
      expect(secondOrder.decayRatioOfDamping(damping)).toBeCloseTo(decay, 4);
      expect(secondOrder.peakTimeS(damping, 1)).toBeCloseTo(peakS, 3);
      expect(secondOrder.resonancePeak(damping)).toBeCloseTo(resonance, 3);
      expect(secondOrder.dampingOfOvershoot(secondOrder.overshootOfDamping(damping))).toBeCloseTo(
        damping,
        12,
      );
    });

  it('answers a step as its formulas say', () => {
    const [naturalRadps, damping] = [3, 0.3];
    const square = naturalRadps * naturalRadps;
    const system = {
      a: new Matrix([
        [0, 1],
        [-square, -2 * damping * naturalRadps],
      ]),
      b: new Matrix([[0], [square]]),
      c: new Matrix([[1, 0]]),
      d: new Matrix([[0]]),
    };
    const peakS = secondOrder.peakTimeS(damping, naturalRadps);
    const [, peak, trough, second] = stepResponse(system, peakS, 4);

    expect(100 * (peak! - 1)).toBeCloseTo(secondOrder.overshootOfDamping(damping), 10);
    expect((second! - 1) / (peak! - 1)).toBeCloseTo(secondOrder.decayRatioOfDamping(damping), 12);
    expect(trough!).toBeLessThan(1);
  });

  it('does not swing with a damping ratio of 1 or more', () => {
    expect(() => secondOrder.overshootOfDamping(1)).toThrowError(RangeError);
    expect(() => secondOrder.peakTimeS(1.2, 3)).toThrowError(RangeError);
    expect(() => secondOrder.dampingOfOvershoot(0)).toThrowError(RangeError);
    expect(() => secondOrder.dampingOfOvershoot(101)).toThrowError(RangeError);
  });
});

describe('aliasHz', () => {
  it('folds a frequency at half the sampling frequency', () => {
    expect([0, 3, 5, 7, 10, 13, 96].map((hz) => aliasHz(hz, 10))).toEqual([0, 3, 5, 3, 0, 3, 4]);
    expect(() => aliasHz(3, 0)).toThrowError(RangeError);
    expect(() => aliasHz(-3, 10)).toThrowError(RangeError);
  });
});
