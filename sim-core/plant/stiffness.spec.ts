import {aDancerScenario, aScenario} from '../test-support/a-scenario';
import {neededParts, paceOf} from './stiffness';

describe('paceOf', () => {
  it('is the spring of web and core when there is no loss', () => {
    // closed form: ω² = (EA/L)·R²/J, greatest where J/R² is least
    const scenario = aScenario({
      web: {lossTimeS: 0},
      roll: {radiusM: 0.0762},
    });
    const stiffness = (3.5e9 * 0.6 * 5e-5) / 3;
    const expected = Math.sqrt((stiffness * 0.0762 * 0.0762) / 0.08);

    expect(paceOf(scenario, 3.5e9, 0.0762).rate).toBeCloseTo(expected, 9);
  });

  it('is no less for a larger roll, a stiffer web or a dancer', () => {
    const cell = aScenario();
    const {rate} = paceOf(cell, 3.5e9, 0.3);

    expect(paceOf(cell, 3.5e9, 0.6).rate).toBeGreaterThanOrEqual(rate);
    expect(paceOf(cell, 7e9, 0.3).rate).toBeGreaterThan(rate);
    expect(paceOf(aDancerScenario(), 3.5e9, 0.3).rate).toBeGreaterThan(rate);
  });
});

describe('a plant step', () => {
  it('must be divided until rate × part is 1 at most', () => {
    const needed = (rate: number): number => neededParts(0.001, {rate, vibration: 0});

    expect([10, 1000, 1001, 16_000, 16_001].map(needed)).toEqual([1, 1, 2, 16, 17]);
  });
});
