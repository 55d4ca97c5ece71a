import {decay} from './decay';
import {logarithm} from './logarithm';
import {Points} from './points';
import {cosine, sine} from './sine';

// The platform's own functions are the outside source: right to about one last place, only not the same
// bits everywhere. Tolerances are relative, sine and cosine absolute.
const many = Array.from({length: 2001}, (_, i) => i / 40);

describe('decay', () => {
  it('is e to the minus x', () => {
    const worst = Math.max(...many.map((x) => Math.abs(decay(x) / Math.exp(-x) - 1)));

    expect(worst).toBeLessThan(1e-15);
  });

  it('is 1 at 0, 0 far out and not a number for one', () => {
    expect(decay(0)).toBe(1);
    expect(decay(800)).toBe(0);
    expect(decay(Infinity)).toBe(0);
    expect(decay(NaN)).toBeNaN();
  });
});

describe('sine and cosine', () => {
  it('are right over many turns, both ways', () => {
    const angles = many.flatMap((x) => [x * 7, -x * 7]);

    expect(Math.max(...angles.map((x) => Math.abs(sine(x) - Math.sin(x))))).toBeLessThan(1e-15);
    expect(Math.max(...angles.map((x) => Math.abs(cosine(x) - Math.cos(x))))).toBeLessThan(1e-15);
  });
});

describe('logarithm', () => {
  it('is right from the smallest draw of the generator to large numbers', () => {
    const values = many.map((x) => Math.exp(x - 23));
    const worst = Math.max(...values.map((x) => Math.abs(logarithm(x) - Math.log(x))));

    expect(worst).toBeLessThan(1e-14);
    expect(logarithm(1)).toBe(0);
  });
});

describe('Points', () => {
  const points = new Points([
    [10, 1],
    [20, 3],
    [40, 2],
  ]);

  it('are joined by straight lines', () => {
    expect(points.at(15)).toBe(2);
    expect(points.at(30)).toBe(2.5);
    expect(points.at(20)).toBe(3);
  });

  it('keep their end values outside', () => {
    expect(points.at(0)).toBe(1);
    expect(points.at(99)).toBe(2);
  });
});
