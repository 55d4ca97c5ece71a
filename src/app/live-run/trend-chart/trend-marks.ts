import {type LogEntry, PHASES, type RunEvent} from '#sim-core/index';
import {entryWords, eventWords, phaseWord} from '#shared/wording/run';
import {type UnitSystem} from '#shared/units';
import type uPlot from 'uplot';
import {type TraceStore} from '../trace/trace-store';
import {type Palette} from './palette';

/** An act or an event on the time axis. */
export interface Mark {
  readonly tick: number;
  readonly label: string;
  readonly isAlarm: boolean;
}

/** A numbered place on the tension trace: where marks were lost. */
export interface PlaceNumber {
  readonly tick: number;
  readonly number: number;
}

/** Marks of everything somebody did and everything that happened, in time's order. */
export function marksOf(
  entries: readonly LogEntry[],
  events: readonly RunEvent[],
  units: UnitSystem,
): Mark[] {
  const acts = entries.flatMap((entry) => {
    const label = entryWords(entry, units);
    return label === null ? [] : [{tick: entry.tick, label, isAlarm: false}];
  });
  const happened = events.flatMap((event) => {
    const label = eventWords(event, units);
    const isAlarm = event.kind === 'webBroke' || event.kind === 'slackBegan';
    return label === null ? [] : [{tick: event.atTick, label, isAlarm}];
  });
  return [...acts, ...happened].sort((a, b) => a.tick - b.tick);
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
  ctx.fillRect(bbox.left, top, bbox.width, bottom - top);
  ctx.restore();
}

/** Draws a line per mark, with its words when there is room. */
export function drawMarks(
  plot: uPlot,
  marks: readonly Mark[],
  sampleS: number,
  palette: Palette,
  withWords: boolean,
): void {
  const {ctx, bbox} = plot;
  const ratio = devicePixelRatio;
  const [from, to] = [plot.scales['x']?.min ?? 0, plot.scales['x']?.max ?? 0];
  ctx.save();
  ctx.font = `${12 * ratio}px "Atkinson Hyperlegible Next Variable", sans-serif`;
  ctx.textAlign = 'left';
  ctx.textBaseline = 'bottom';
  let freeFrom = -Infinity;
  for (const mark of marks) {
    const seconds = mark.tick * sampleS;
    if (seconds < from || seconds > to) continue;
    const x = plot.valToPos(seconds, 'x', true);
    ctx.strokeStyle = mark.isAlarm ? palette.vermilion : palette.muted;
    ctx.setLineDash([2 * ratio, 4 * ratio]);
    ctx.lineWidth = ratio;
    ctx.beginPath();
    ctx.moveTo(x, bbox.top);
    ctx.lineTo(x, bbox.top + bbox.height);
    ctx.stroke();
    if (!withWords || x < freeFrom) continue;
    ctx.fillStyle = mark.isAlarm ? palette.vermilion : palette.muted;
    ctx.fillText(mark.label, x + 4 * ratio, bbox.top + bbox.height - 3 * ratio);
    freeFrom = x + ctx.measureText(mark.label).width + 10 * ratio;
  }
  ctx.restore();
}

/** Draws numbered places on the tension trace; `valueAt` gives the shown tension of a tick. */
export function drawNumbers(
  plot: uPlot,
  numbers: readonly PlaceNumber[],
  sampleS: number,
  palette: Palette,
  valueAt: (tick: number) => number,
): void {
  const {ctx, bbox} = plot;
  const ratio = devicePixelRatio;
  const radius = 9 * ratio;
  ctx.save();
  ctx.font = `600 ${12 * ratio}px "Atkinson Hyperlegible Next Variable", sans-serif`;
  ctx.textAlign = 'center';
  ctx.textBaseline = 'middle';
  let freeFrom = -Infinity;
  for (const {tick, number} of numbers.toSorted((a, b) => a.tick - b.tick)) {
    // Two numbers of one moment stand beside each other.
    const x = Math.max(freeFrom, plot.valToPos(tick * sampleS, 'x', true));
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
export function drawPhases(
  plot: uPlot,
  trace: TraceStore,
  sampleS: number,
  palette: Palette,
): void {
  const {ctx, bbox} = plot;
  const ratio = devicePixelRatio;
  const height = 16 * ratio;
  const top = bbox.top - height - 2 * ratio;
  const first = Math.max(0, Math.floor((plot.scales['x']?.min ?? 0) / sampleS));
  const end = Math.min(trace.count, Math.ceil((plot.scales['x']?.max ?? 0) / sampleS));
  ctx.save();
  ctx.font = `${12 * ratio}px "Atkinson Hyperlegible Next Variable", sans-serif`;
  ctx.textAlign = 'left';
  ctx.textBaseline = 'middle';
  for (const {phase, from, to} of phaseSpans(trace, first, end)) {
    const left = plot.valToPos(from * sampleS, 'x', true);
    const right = plot.valToPos(to * sampleS, 'x', true);
    ctx.fillStyle = phase === 2 ? palette.band : palette.shade;
    ctx.fillRect(left, top, right - left, height);
    const word = phaseWord(PHASES[phase]!);
    if (ctx.measureText(word).width + 8 * ratio > right - left) continue;
    ctx.fillStyle = palette.muted;
    ctx.fillText(word, left + 4 * ratio, top + height / 2);
  }
  ctx.restore();
}

/** Stretches of rows with one phase; looked at every 5th row, which is finer than a pixel. */
function phaseSpans(
  trace: TraceStore,
  first: number,
  end: number,
): {phase: number; from: number; to: number}[] {
  const spans: {phase: number; from: number; to: number}[] = [];
  const step = Math.max(1, Math.min(5, Math.floor((end - first) / 2000)));
  for (let row = first; row < end; row += step) {
    const phase = trace.at(row, 'phase');
    const last = spans.at(-1);
    if (last?.phase === phase) last.to = row + step;
    else spans.push({phase, from: row, to: row + step});
  }
  return spans;
}
