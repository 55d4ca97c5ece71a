import {nextNormal, nextWord, normalQuantile, RANDOM_SIZE, seedWords} from './random';

/**
 * First draws for seed 1. From a program written apart in Python: the generator and its seeding by integer
 * arithmetic, the quantiles by statistics.NormalDist().inv_cdf of Python 3.
 */
const PRINTED = [
  -1.3311518060396326, 0.015536215738390853, 1.2169733105459715, -0.03195195066849745,
  -0.16551282853772206, 0.01849452043577469, 0.6643904687124955, 0.42755431902239466,
  -1.125588516275383, 0.8084192058407161, 1.5514041379304775, -0.1276076137168159,
  1.6456815198692847, -1.1943582267759334, 0.38365326877881756, 1.3639997217702797,
  -0.8146560143358558, -1.6506369288475113, -0.05576039026671314, 0.5303728740853317,
];

function draws(seed: number, count: number): number[] {
  const state = new Float64Array(RANDOM_SIZE);
  seedWords(state, seed);
  return Array.from({length: count}, () => nextNormal(state));
}

describe('the generator', () => {
  it('gives the published sequence of xoshiro128** from the words 1, 2, 3, 4', () => {
    // reference vector that ships with rand_xoshiro (Rust), made with the authors' C code
    const published = [
      11520, 0, 5927040, 70819200, 2031721883, 1637235492, 1287239034, 3734860849, 3729100597,
      4258142804,
    ];
    const state = Float64Array.of(1, 2, 3, 4);

    expect(published.map(() => nextWord(state))).toEqual(published);
  });

  it('goes on from its state alone', () => {
    const state = new Float64Array(RANDOM_SIZE);
    seedWords(state, 4294967295);
    nextNormal(state);
    const copy = state.slice();

    expect(nextNormal(state)).toBe(nextNormal(copy));
  });
});

describe('normal draws', () => {
  it('are the twenty printed ones for seed 1', () => {
    draws(1, PRINTED.length).forEach((draw, place) => {
      expect(draw).toBeCloseTo(PRINTED[place]!, 13);
    });
  });

  it('have mean 0, variance 1 and the tails of a normal distribution', () => {
    const many = draws(7, 100_000);
    const mean = many.reduce((sum, x) => sum + x, 0) / many.length;
    const square = many.reduce((sum, x) => sum + x * x, 0) / many.length;
    const beyondTwo = many.filter((x) => Math.abs(x) > 2).length / many.length;

    expect(Math.abs(mean)).toBeLessThan(0.013); // four standard errors
    expect(Math.abs(square - 1)).toBeLessThan(0.018);
    expect(Math.abs(beyondTwo - 0.0455)).toBeLessThan(0.0027);
  });
});

describe('normalQuantile', () => {
  it('agrees with published quantiles', () => {
    // M. J. Wichura, AS 241: the test values of PPND16
    expect(normalQuantile(0.25)).toBeCloseTo(-0.6744897501960817, 15);
    expect(normalQuantile(0.001)).toBeCloseTo(-3.090232306167814, 14);
    expect(normalQuantile(1e-20)).toBeCloseTo(-9.262340089798409, 13);
    expect(normalQuantile(0.975)).toBeCloseTo(1.95996398454005, 13); // any table of the distribution
  });
});
