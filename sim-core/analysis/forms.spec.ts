import * as forms from './forms';

// Expected values by hand from the forms themselves; number 41 of the handbook is in handbook/controller.spec.ts.
describe('forms of a PID', () => {
  it('keep the controller: both have the same gain at every frequency', () => {
    const series = {gain: 1.7, integralS: 0.8, derivativeS: 0.15};
    const standard = forms.seriesToStandard(series);
    // at s = 1/s, a real number: Kc'·(1 + 1/Ti')·(1 + Td') = Kc·(1 + 1/Ti + Td)
    expect(standard.gain * (1 + 1 / standard.integralS + standard.derivativeS)).toBeCloseTo(
      1.7 * (1 + 1 / 0.8) * 1.15,
      12,
    );
    expect(forms.standardToParallel(standard).integralGain).toBeCloseTo(1.7 / 0.8, 12);
  });

  it('have no series form when Ti < 4·Td, and the double zero at Ti = 4·Td', () => {
    expect(forms.standardToSeries({gain: 1, integralS: 3.9, derivativeS: 1})).toBeNull();
    expect(forms.standardToSeries({gain: 1, integralS: 4, derivativeS: 1})).toEqual({
      gain: 0.5,
      integralS: 2,
      derivativeS: 2,
    });
  });

  it('are the same for a PI, a P and a PD', () => {
    for (const form of [
      {gain: 2, integralS: 5, derivativeS: 0},
      {gain: 2, integralS: Infinity, derivativeS: 0},
      {gain: 2, integralS: Infinity, derivativeS: 3},
    ]) {
      expect(forms.standardToSeries(form)).toEqual(form);
      expect(forms.seriesToStandard(form)).toEqual(form);
      expect(forms.parallelToStandard(forms.standardToParallel(form))).toEqual(form);
    }
  });

  it('refuse a standard form without a proportional part', () => {
    const integralOnly = {proportionalGain: 0, integralGain: 1, derivativeGain: 0};
    expect(() => forms.parallelToStandard(integralOnly)).toThrowError(RangeError);
  });

  it('convert the units of a gain', () => {
    // 0.1 %/% on 400 N: 1 % is 4 N
    expect(forms.gainPerNewton(0.1, 400)).toBeCloseTo(0.025, 15);
    expect(forms.gainPerPct(0.025, 400)).toBeCloseTo(0.1, 15);
    expect(forms.proportionalBandPct(4)).toBe(25);
    expect(forms.repeatsPerMinute(30)).toBe(2);
  });
});
