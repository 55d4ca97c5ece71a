/** Median and extremes of repeated measurements. */
export interface Spread {
  readonly median: number;
  readonly least: number;
  readonly greatest: number;
}

export function spreadOf(values: readonly number[]): Spread {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = Math.floor(sorted.length / 2);
  const median =
    sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
  return {median, least: sorted[0]!, greatest: sorted.at(-1)!};
}
