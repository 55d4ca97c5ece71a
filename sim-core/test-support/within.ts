/** Expects a value within a share of the expected one (0.001: 0.1 %), as a table of tolerances gives it. */
export function expectWithin(value: number, expected: number, share: number): void {
  const context = `${value} against ${expected}, ${(100 * (value / expected - 1)).toPrecision(3)} % off`;
  expect(Math.abs(value - expected))
    .withContext(context)
    .toBeLessThanOrEqual(share * Math.abs(expected));
}

/** Expects a value within an amount of the expected one. */
export function expectNear(value: number, expected: number, amount: number): void {
  expect(Math.abs(value - expected))
    .withContext(`${value} against ${expected}`)
    .toBeLessThanOrEqual(amount);
}
