/** A value within a share of the expected one (0.001: 0.1 %), as a table of tolerances gives it; for toEqual. */
export function within(expected: number, share: number): number {
  return matcher(expected, share * Math.abs(expected), `within ${100 * share} % of ${expected}`);
}

/** A value within an amount of the expected one; for toEqual. */
export function near(expected: number, amount: number): number {
  return matcher(expected, amount, `within ${amount} of ${expected}`);
}

/** What jasmine calls an asymmetric matcher; it stands where a number is expected. */
function matcher(expected: number, amount: number, text: string): number {
  const asymmetric = {
    asymmetricMatch: (value: unknown): boolean =>
      typeof value === 'number' && Math.abs(value - expected) <= amount,
    jasmineToString: (): string => text,
  };
  return asymmetric as unknown as number;
}
