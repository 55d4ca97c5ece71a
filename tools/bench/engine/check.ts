import {type Case, rangeN} from './cases';
import {type Programs} from './programs';

/** Greatest error in tension that counts as right [% of range]. */
export const TOLERANCE_PCT = 0.02;

const EVERY_S = 0.1;

/** Worst difference in tension at any row [% of range]; Infinity when rows are missing. */
export interface Accuracy {
  readonly name: string;
  /** Against the independent solver; null without its answer. */
  readonly enginePct: number | null;
  readonly plainPct: number | null;
  /** Between the two. */
  readonly apartPct: number;
  readonly isRight: boolean;
}

/** Runs a case on both sides and compares. Without a true answer the two need only agree. */
export function accuracyOf(programs: Programs, each: Case): Accuracy {
  const {name, document, trueN} = each;
  const everyTicks = Math.round(EVERY_S / (document.controller.sampleS ?? 0.01));
  const engine = programs.engineRows(each, everyTicks);
  const plain = programs.plainRows(each, EVERY_S);
  const range = rangeN(document);
  const enginePct = trueN === undefined ? null : worstPct(engine, trueN, range);
  const plainPct = trueN === undefined ? null : worstPct(plain, trueN, range);
  const apartPct = worstPct(engine, plain, range);
  const counts = trueN === undefined ? [apartPct] : [enginePct, plainPct];
  return {
    name,
    enginePct,
    plainPct,
    apartPct,
    isRight: counts.every((pct) => pct! < TOLERANCE_PCT),
  };
}

function worstPct(some: readonly number[], other: readonly number[], range: number): number {
  if (some.length !== other.length) return Infinity;
  let worst = 0;
  some.forEach((value, row) => {
    const gap = Math.abs(value - other[row]!);
    if (!(gap <= worst)) worst = gap; // also NaN, which then fails the tolerance
  });
  return (100 * worst) / range;
}
