import {phaseWord} from '#shared/wording/run';
import type uPlot from 'uplot';
import {type Palette} from './palette';
import {type Mark, type PlaceNumber} from './trend-marks';
import {SAMPLE_S} from '../sample-period';
import {type PhaseSpan} from './trend-scene';

/** Height of the strip of phases above the tension [px]. */
export const STRIP_PX = 18;
/** Least distance between two names of traces [px]. */
const LINE_PX = 14;

/** A trace's name beside its end. */
export interface TraceName {
  readonly text: string;
  readonly colour: string;
  /** Where the trace ends, in the plot's units. */
  readonly x: number;
  readonly y: number;
  readonly scale: string;
}

/** Draws the tolerance band below the traces. */
export function drawBand(
  plot: uPlot,
  band: {readonly lowest: number; readonly highest: number},
  palette: Palette,
): void {
  const {ctx, bbox} = plot;
  const top = Math.max(bbox.top, plot.valToPos(band.highest, 'y', true));
  const bottom = Math.min(bbox.top + bbox.height, plot.valToPos(band.lowest, 'y', true));
  ctx.save();
  ctx.fillStyle = palette.band;
  ctx.fillRect(bbox.left, top, bbox.width, Math.max(0, bottom - top));
  ctx.restore();
}

/** Draws a line per mark, with its words when there is room. */
export function drawMarks(
  plot: uPlot,
  marks: readonly Mark[],
  palette: Palette,
  withWords: boolean,
): void {
  const {ctx, bbox} = plot;
  const ratio = devicePixelRatio;
  const [from, to] = [plot.scales['x']?.min ?? 0, plot.scales['x']?.max ?? 0];
  write(ctx, 12, 'bottom');
  ctx.setLineDash([2 * ratio, 4 * ratio]);
  ctx.lineWidth = ratio;
  let freeFrom = -Infinity;
  for (const mark of marks) {
    const seconds = mark.tick * SAMPLE_S;
    if (seconds < from || seconds > to) continue;
    const x = Math.round(plot.valToPos(seconds, 'x', true)) + 0.5;
    ctx.strokeStyle = mark.isAlarm ? palette.vermilion : palette.muted;
    ctx.beginPath();
    ctx.moveTo(x, bbox.top);
    ctx.lineTo(x, bbox.top + bbox.height);
    ctx.stroke();
    if (!withWords || x < freeFrom) continue;
    const width = ctx.measureText(mark.label).width;
    const isRight = x + width + 8 * ratio > bbox.left + bbox.width;
    const left = isRight ? x - width - 4 * ratio : x + 4 * ratio;
    if (left < freeFrom) continue;
    ctx.fillStyle = mark.isAlarm ? palette.vermilion : palette.muted;
    ctx.fillText(mark.label, left, bbox.top + bbox.height - 3 * ratio);
    freeFrom = left + width + 10 * ratio;
  }
  ctx.restore();
}

/** Draws numbered places on the tension trace; `valueAt` gives the shown tension of a tick. */
export function drawNumbers(
  plot: uPlot,
  numbers: readonly PlaceNumber[],
  palette: Palette,
  valueAt: (tick: number) => number,
): void {
  const {ctx, bbox} = plot;
  const ratio = devicePixelRatio;
  const radius = 9 * ratio;
  write(ctx, 12, 'middle', 600);
  ctx.textAlign = 'center';
  let freeFrom = -Infinity;
  for (const {tick, number} of numbers.toSorted((a, b) => a.tick - b.tick)) {
    // Two numbers of one moment stand beside each other.
    const x = Math.max(freeFrom, plot.valToPos(tick * SAMPLE_S, 'x', true));
    freeFrom = x + 2 * radius + 2 * ratio;
    if (x < bbox.left || x > bbox.left + bbox.width) continue;
    const wanted = plot.valToPos(valueAt(tick), 'y', true);
    const y = Math.min(bbox.top + bbox.height - radius, Math.max(bbox.top + radius, wanted));
    ctx.beginPath();
    ctx.arc(x, y, radius, 0, 2 * Math.PI);
    ctx.fillStyle = palette.vermilion;
    ctx.fill();
    ctx.fillStyle = palette.sheet;
    ctx.fillText(`${number}`, x, y + ratio);
  }
  ctx.restore();
}

/** Draws the phases as a strip along the top of the plot. */
export function drawPhases(plot: uPlot, spans: readonly PhaseSpan[], palette: Palette): void {
  const {ctx, bbox} = plot;
  const ratio = devicePixelRatio;
  const height = (STRIP_PX - 4) * ratio;
  const top = bbox.top - STRIP_PX * ratio;
  const edge = bbox.left + bbox.width;
  const now = plot.data[0].at(-1) ?? 0;
  write(ctx, 11.5, 'middle');
  for (const {phase, fromTick, toTick} of spans) {
    const left = Math.max(bbox.left, plot.valToPos(fromTick * SAMPLE_S, 'x', true));
    const right = Math.min(
      edge,
      plot.valToPos(Math.min(now, toTick * SAMPLE_S), 'x', true) - ratio,
    );
    if (right <= left) continue;
    ctx.fillStyle = phase === 'running' ? palette.band : palette.shade;
    ctx.fillRect(left, top, right - left, height);
    const word = phaseWord(phase);
    if (ctx.measureText(word).width + 8 * ratio > right - left) continue;
    ctx.fillStyle = palette.muted;
    ctx.fillText(word, left + 5 * ratio, top + height / 2 + ratio / 2);
  }
  ctx.restore();
}

/** Writes each trace's name beside its end; names that would touch are moved apart. */
export function drawNames(plot: uPlot, names: readonly TraceName[]): void {
  const {ctx, bbox} = plot;
  const ratio = devicePixelRatio;
  const placed = names
    .map((name) => ({
      ...name,
      left: plot.valToPos(name.x, 'x', true) + 6 * ratio,
      top: plot.valToPos(name.y, name.scale, true),
    }))
    .filter(({left}) => left > bbox.left)
    .sort((a, b) => a.top - b.top);
  write(ctx, 12, 'middle', 600);
  let free = bbox.top + 4 * ratio;
  placed.forEach((name, place) => {
    const below = placed.length - 1 - place;
    const lowest = bbox.top + bbox.height - below * LINE_PX * ratio;
    const y = Math.min(lowest, Math.max(free, name.top));
    free = y + LINE_PX * ratio;
    ctx.fillStyle = name.colour;
    ctx.fillText(name.text, name.left, y);
  });
  ctx.restore();
}

/** Begins to write on the canvas; whoever calls it restores. */
function write(
  ctx: CanvasRenderingContext2D,
  sizePx: number,
  baseline: CanvasTextBaseline,
  weight = 400,
): void {
  ctx.save();
  ctx.font = `${weight} ${sizePx * devicePixelRatio}px "Atkinson Hyperlegible Next Variable", sans-serif`;
  ctx.textAlign = 'left';
  ctx.textBaseline = baseline;
}
