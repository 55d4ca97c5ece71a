import * as at from './controller-state';
import * as seen from './seen';
import * as set from './tuning';

/** One tick of the PID in ISA standard form; returns the output [%] and leaves I, d and the limit in the state. */
export function pidOutput(state: Float64Array, tuning: Float64Array, news: Float64Array): number {
  const y = news[seen.Y]!;
  const r = news[seen.R]!;
  const assist = news[seen.ASSIST_PCT]!;
  const compensation = news[seen.COMPENSATION]!;
  const gain = news[seen.SENSE]! * news[seen.GAIN]!;
  const sampleS = tuning[set.SAMPLE_S]!;
  const proportional = gain * (tuning[set.WEIGHT]! * r - y);

  if (state[at.CLOSED] === 0) {
    // the loop closes: no derivative kick, and I such that the output goes on from the one in force
    state[at.LAST_Y] = y;
    state[at.DERIVATIVE] = 0;
    if (tuning[set.IS_BUMPLESS] === 1)
      state[at.INTEGRAL] = (state[at.OUTPUT]! - assist) / compensation - proportional;
    state[at.CLOSED] = 1;
  }

  const tdS = tuning[set.TD]!;
  if (tdS > 0) {
    const filterS = tdS / tuning[set.DERIVATIVE_N]!;
    const change = y - state[at.LAST_Y]!;
    state[at.DERIVATIVE] = (filterS * state[at.DERIVATIVE]! + change) / (filterS + sampleS);
  } else state[at.DERIVATIVE] = 0;
  state[at.LAST_Y] = y;

  const derivative = gain * tdS * state[at.DERIVATIVE];
  const wanted = compensation * (proportional + state[at.INTEGRAL]! - derivative) + assist;
  const output = slowed(set.clampOutput(tuning, wanted), state[at.OUTPUT]!, tuning);
  const limit = wanted >= tuning[set.OUT_MAX]! ? 1 : wanted <= tuning[set.OUT_MIN]! ? -1 : 0;
  state[at.LIMIT] = limit;

  const tiS = tuning[set.TI]!;
  if (tiS > 0) {
    const error = news[seen.SENSE]! * (r - y);
    const step = ((news[seen.GAIN]! * sampleS) / tiS) * error;
    const windup = tuning[set.WINDUP];
    if (windup === set.BACK_CALCULATION)
      state[at.INTEGRAL]! += step + (sampleS / tuning[set.TRACKING_S]!) * (output - wanted);
    else if (windup === set.NO_ANTI_WINDUP || !pushes(limit, wanted - output, error))
      state[at.INTEGRAL]! += step;
  }
  return output;
}

/** An output that moves no faster than its rate from the one before. */
function slowed(output: number, before: number, tuning: Float64Array): number {
  const rate = tuning[set.OUT_RATE]!;
  if (rate === 0) return output;
  const most = rate * tuning[set.SAMPLE_S]!;
  return Math.min(Math.max(output, before - most), before + most);
}

/** Whether the error drives an output further out that is held by a limit or, `beyond` it, by its rate. */
function pushes(limit: number, beyond: number, error: number): boolean {
  return limit === 0 ? beyond * error > 0 : limit * error > 0;
}
