import {type TrendPlace} from '../run/log';
import {type TraceColumn} from '../run/trace';

/** Rows to measure on: a TraceBlock, or any store of a run. Row r is control tick r. */
export interface TraceRows {
  readonly count: number;
  at(row: number, column: TraceColumn): number;
}

/** Rows from `from` up to `to`, `to` excluded. */
export interface Span {
  readonly from: number;
  readonly to: number;
}

/** A measured value (SI) and where on the trend it was seen. */
export interface Measured {
  readonly value: number;
  readonly place: TrendPlace;
}

/** A place from one row through another. */
export function placeOf(fromTick: number, toTick: number, trace: TrendPlace['trace']): TrendPlace {
  return {fromTick, toTick, trace};
}
