/**
 * The same value with 0 for every −0 in it. JSON cannot carry a −0, so a run that felt one would not be the run that
 * its stored document replays. The value itself when there is none, as nearly always.
 */
export function withoutNegativeZeros<T>(value: T): T {
  return hasNegativeZero(value) ? (copied(value) as T) : value;
}

function hasNegativeZero(value: unknown): boolean {
  if (typeof value === 'number') return value === 0 && 1 / value < 0;
  if (typeof value !== 'object' || value === null) return false;
  return Object.values(value).some(hasNegativeZero);
}

function copied(value: unknown): unknown {
  if (typeof value === 'number') return value + 0;
  if (Array.isArray(value)) return value.map(copied);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([key, inner]) => [key, copied(inner)]));
}
