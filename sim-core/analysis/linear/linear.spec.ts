import {Matrix} from 'ml-matrix';
import {near} from '../../test-support/within';
import {closedLoopPoles, isStable, loopResponse} from './closed-loop';
import {angle, complex, magnitude, minus, over, plus, times, turn} from './complex';
import {exponential} from './exponential';
import {firstOrderLag, integrator} from './process-models';
import {sampled} from './sampled';
import {frequencyResponse, series, seriesWithBoth} from './state-space';
import {stepResponse} from './step-response';

function expectMatrix(actual: Matrix, expected: readonly (readonly number[])[], digits = 13): void {
  expect([actual.rows, actual.columns]).toEqual([expected.length, expected[0]!.length]);
  expected.forEach((row, i) => {
    row.forEach((value, j) => expect(actual.get(i, j)).toBeCloseTo(value, digits));
  });
}

// Closed forms throughout.
describe('complex numbers', () => {
  it('reckon as they should', () => {
    const a = complex(3, 4);
    const b = complex(1, -2);

    expect(plus(a, b)).toEqual(complex(4, 2));
    expect(minus(a, b)).toEqual(complex(2, 6));
    expect(times(a, b)).toEqual(complex(11, -2));
    expect(over(times(a, b), b)).toEqual(a);
    expect(magnitude(a)).toBe(5);
    expect(angle(turn(0.7))).toBeCloseTo(0.7, 15);
  });
});

describe('exponential', () => {
  it('turns, grows and vanishes', () => {
    expectMatrix(
      exponential(
        new Matrix([
          [0, 2],
          [-2, 0],
        ]),
      ),
      [
        [Math.cos(2), Math.sin(2)],
        [-Math.sin(2), Math.cos(2)],
      ],
    );
    expectMatrix(
      exponential(
        new Matrix([
          [0, 1, 0],
          [0, 0, 1],
          [0, 0, 0],
        ]),
      ),
      [
        [1, 1, 0.5],
        [0, 1, 1],
        [0, 0, 1],
      ],
    );
    expectMatrix(exponential(new Matrix([[-1000]])), [[0]]);
    expectMatrix(exponential(new Matrix([[1e-9]])), [[1 + 1e-9]], 15);
    expect(exponential(Matrix.zeros(0, 0)).rows).toBe(0);
  });

  it('keeps its digits between fast and slow: a triangle with −500 and −0.1', () => {
    const fast = Math.exp(-500);
    const slow = Math.exp(-0.1);
    expectMatrix(
      exponential(
        new Matrix([
          [-500, 1],
          [0, -0.1],
        ]),
      ),
      [
        [fast, (slow - fast) / 499.9],
        [0, slow],
      ],
      12, // ten squarings
    );
  });

  it('refuses what has none', () => {
    expect(() => exponential(Matrix.zeros(2, 3))).toThrowError(RangeError);
    expect(() => exponential(new Matrix([[NaN]]))).toThrowError(RangeError);
  });
});

describe('frequencyResponse', () => {
  it('is gain/(1 + jωτ) of a lag, gain/(jω) of an integrator, and their product in series', () => {
    const lag = over(complex(3), complex(1, 2 * 0.4));
    const sum = over(complex(5), complex(0, 2));

    for (const [actual, expected] of [
      [frequencyResponse(firstOrderLag(3, 0.4), 2), lag],
      [frequencyResponse(integrator(5), 2), sum],
      [frequencyResponse(series(firstOrderLag(3, 0.4), integrator(5)), 2), times(lag, sum)],
      [frequencyResponse(seriesWithBoth(firstOrderLag(3, 0.4), integrator(5)), 2, 1), lag],
      [frequencyResponse(firstOrderLag(3, 0), 2), complex(3)],
      [frequencyResponse(series(firstOrderLag(3, 0), integrator(5)), 2), times(complex(3), sum)],
      [frequencyResponse(series(integrator(5), firstOrderLag(3, 0)), 2), times(complex(3), sum)],
    ] as const) {
      expect(actual.re).toBeCloseTo(expected.re, 14);
      expect(actual.im).toBeCloseTo(expected.im, 14);
    }
  });

  it('has no value at a pole', () => {
    expect(() => frequencyResponse(integrator(1), 0)).toThrowError();
    expect(() => firstOrderLag(1, -1)).toThrowError(RangeError);
  });
});

describe('sampled', () => {
  it('steps a lag and an integrator as they go', () => {
    expect(stepResponse(firstOrderLag(2, 0.5), 0.1, 4)).toEqual(
      [0, 0.1, 0.2, 0.3].map((t) => closeTo(2 * (1 - Math.exp(-t / 0.5)))),
    );
    expect(stepResponse(integrator(3), 0.1, 3)).toEqual([0, 0.3, 0.6].map(closeTo));
    expect(stepResponse(firstOrderLag(2, 0), 0.1, 2)).toEqual([2, 2]);
  });

  for (const deadTimeS of [0, 0.1, 0.2, 0.04, 0.25, 0.3])
    it(`waits ${deadTimeS} s, a whole number of samples or not`, () => {
      const expected = Array.from({length: 8}, (_, k) => {
        const since = 0.1 * k - deadTimeS;
        return closeTo(since > 0 ? 2 * (1 - Math.exp(-since / 0.5)) : 0);
      });

      expect(stepResponse(firstOrderLag(2, 0.5), 0.1, 8, {deadTimeS})).toEqual(expected);
    });

  it('lets a pure gain through after its dead time', () => {
    expect(stepResponse(firstOrderLag(2, 0), 0.1, 5, {deadTimeS: 0.2})).toEqual([0, 0, 2, 2, 2]);
    expect(stepResponse(firstOrderLag(2, 0), 0.1, 5, {deadTimeS: 0.15})).toEqual([0, 0, 2, 2, 2]);
  });

  it('refuses a period of 0 and a dead time below 0', () => {
    expect(() => sampled(integrator(1), 0)).toThrowError(RangeError);
    expect(() => sampled(integrator(1), 0.1, -0.1)).toThrowError(RangeError);
  });
});

describe('the closed loop', () => {
  it('of an integrator and P decays by 1 − gain·Ts a sample', () => {
    const process = sampled(integrator(2), 0.1);
    const controller = {gain: 3, integralS: 0};
    const {process: outputs} = loopResponse(process, controller, {setPoint: () => 1}, 4);

    expect(outputs[0]).toEqual([0, 1, 2, 3].map((k) => closeTo(1 - 0.4 ** k)));
    expect(closedLoopPoles(process, controller).map(([re]) => re)).toContain(closeTo(0.4));
    expect(isStable(process, controller)).toBeTrue();
    expect(isStable(process, {gain: 9.99, integralS: 0})).toBeTrue(); // pole at −0.998
    expect(isStable(process, {gain: 10.01, integralS: 0})).toBeFalse();
  });

  it('takes away a load with an integral part, and keeps an offset without', () => {
    const process = sampled(firstOrderLag(2, 1), 0.02, 0.1);
    const last = (integralS: number): number =>
      loopResponse(process, {gain: 1, integralS}, {load: () => 1}, 2000).process[0]!.at(-1)!;

    expect(last(1)).toBeCloseTo(0, 9);
    expect(last(0)).toBeCloseTo(2 / 3, 9);
  });

  it('is at its edge at the ultimate gain 8.5024 of K 1, τ 10 s, θ 2 s', () => {
    // the project's handbook, M 49 (P, O); a hold of 10 ms adds half of that to θ: 0.2 %
    const process = sampled(firstOrderLag(1, 10), 0.01 * 2, 2);

    expect(isStable(process, {gain: 8.5024 * 0.99, integralS: 0})).toBeTrue();
    expect(isStable(process, {gain: 8.5024 * 1.01, integralS: 0})).toBeFalse();
  });

  it('weighs the set point as F.3 of the handbook', () => {
    // the sequence M 42 as deviations: an integrator that nothing moves measures 0
    const process = sampled(integrator(0), 0.1);
    const controller = {gain: 2, integralS: 10, derivativeS: 1, setPointWeight: 0.8};
    const {output} = loopResponse(process, controller, {setPoint: () => 10}, 3);

    expect(output).toEqual([16, 16.2, 16.4].map(closeTo));
  });

  it('filters the derivative of the measurement', () => {
    // by hand, y[k+1] = y[k] + u[k] and Tf = Ts: d = (Ts·d + Δy)/(2·Ts), u = 2·(8 − y) − 2·d
    const process = sampled(integrator(10), 0.1);
    const controller = {gain: 2, integralS: 0, derivativeS: 1, setPointWeight: 0.8};
    const {output} = loopResponse(process, controller, {setPoint: () => 10}, 3);

    expect(output).toEqual([16, -176, 2016].map(closeTo));
  });

  it('refuses a process that answers at once', () => {
    const gain = sampled(firstOrderLag(2, 0), 0.1);

    expect(() => loopResponse(gain, {gain: 1, integralS: 1}, {}, 1)).toThrowError(RangeError);
    expect(() => closedLoopPoles(gain, {gain: 1, integralS: 1})).toThrowError(RangeError);
  });
});

/** Equal to within rounding. */
function closeTo(expected: number): number {
  return near(expected, 1e-12);
}
