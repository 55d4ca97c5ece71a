import {type TrendPlace} from '../run/log';
import {placeOf, type Span, type TraceRows} from './rows';

/** Half-waves below this share of the greatest are the web's own breathing or noise. */
const COUNTED_SHARE = 0.1;

/** How tension swings about the value it comes to. */
export interface Oscillation {
  /** Mean time between successive peaks of one side [s]. */
  readonly periodS: number;
  /** Half the height from the last trough to the last peak [N]. */
  readonly amplitudeN: number;
  /** Height of the second peak over that of the first on the same side, both above the final value; 1: no decay. */
  readonly decayRatio: number;
  readonly place: TrendPlace;
}

/** A stretch on one side of the middle, with its farthest point. */
interface HalfWave {
  readonly row: number;
  /** Above the middle positive, below negative [N]. */
  readonly height: number;
}

/**
 * Oscillation of true tension in the span about the mean of its last quarter; null when fewer than two peaks of
 * one side stand out. Decay ratio as in the textbooks: the ratio of successive peaks (handbook G.6).
 */
export function oscillation(rows: TraceRows, span: Span, sampleS: number): Oscillation | null {
  const to = Math.min(span.to, rows.count);
  if (to - span.from < 8) return null;
  const waves = halfWaves(rows, {from: span.from, to});
  const most = Math.max(0, ...waves.map(({height}) => Math.abs(height)));
  const counted = joined(waves.filter(({height}) => Math.abs(height) >= COUNTED_SHARE * most));
  const first = counted.find((wave, place) => place + 2 < counted.length && wave.height !== 0);
  if (most === 0 || first === undefined) return null;
  const side = Math.sign(first.height);
  const peaks = counted.filter(({height}) => Math.sign(height) === side);
  const last = counted[counted.length - 1]!;
  const before = counted[counted.length - 2]!;
  const end = peaks[peaks.length - 1]!;
  return {
    periodS: ((end.row - first.row) * sampleS) / (peaks.length - 1),
    amplitudeN: Math.abs(last.height - before.height) / 2,
    decayRatio: peaks[1]!.height / first.height,
    place: placeOf(first.row, last.row, 'tension'),
  };
}

function halfWaves(rows: TraceRows, {from, to}: Span): HalfWave[] {
  const quarter = Math.max(1, Math.floor((to - from) / 4));
  let sum = 0;
  for (let row = to - quarter; row < to; row++) sum += rows.at(row, 'tensionN');
  const middle = sum / quarter;
  const waves: HalfWave[] = [];
  let wave: HalfWave = {row: from, height: 0};
  for (let row = from; row < to; row++) {
    const height = rows.at(row, 'tensionN') - middle;
    if (height * wave.height < 0) {
      waves.push(wave);
      wave = {row, height};
    } else if (Math.abs(height) > Math.abs(wave.height)) wave = {row, height};
  }
  return [...waves, wave];
}

/** Half-waves of one side that only noise parted become one. */
function joined(waves: readonly HalfWave[]): HalfWave[] {
  const sides: HalfWave[] = [];
  for (const wave of waves) {
    const last = sides[sides.length - 1];
    if (last === undefined || last.height * wave.height < 0) sides.push(wave);
    else if (Math.abs(wave.height) > Math.abs(last.height)) sides[sides.length - 1] = wave;
  }
  return sides;
}
