import {type TraceColumn} from '#sim-core/index';
import {type Quantity, toPerson, written} from '#shared/units';
import type uPlot from 'uplot';
import {type PointBuffer} from '../trace/min-max-pyramid';
import {makePlot, type PlotSpec} from './make-plot';
import {type Palette} from './palette';
import {
  drawBand,
  drawMarks,
  drawNames,
  drawNumbers,
  drawPhases,
  STRIP_PX,
  type TraceName,
} from './trend-drawing';
import {SAMPLE_S} from '../sample-period';
import {type TrendScene} from './trend-scene';

/** More points than this are more than pixels. */
const MOST_POINTS = 4100;
/** Room for the traces' names [px]. */
const NAMES_PX = 104;
const BARE_PX = 20;
/** How the height is shared between tension, output and speed. */
const SHARES = [0.5, 0.22, 0.28] as const;

interface Line {
  readonly name: TraceColumn;
  readonly label: string;
  readonly quantity: Quantity;
  /** Shown value = stored × this: a radius is shown as a diameter. */
  readonly times: number;
  readonly colour: keyof Palette;
  readonly width: number;
  readonly dash?: number[];
  readonly scale?: 'diameter';
}

const SET_POINT: Line = {
  name: 'setPointN',
  label: 'set point',
  quantity: 'tension',
  times: 1,
  colour: 'pine',
  width: 1.5,
  dash: [6, 4],
};
const MEASURED: Line = {
  name: 'measuredN',
  label: 'measured',
  quantity: 'tension',
  times: 1,
  colour: 'measured',
  width: 1.75,
};
const TRUTH: Line = {
  name: 'tensionN',
  label: 'true',
  quantity: 'tension',
  times: 1,
  colour: 'ink',
  width: 1.5,
};
const OUTPUT: Line = {
  name: 'outputPct',
  label: 'brake',
  quantity: 'percent',
  times: 1,
  colour: 'output',
  width: 1.75,
};
const SPEED: Line = {
  name: 'lineMps',
  label: 'line',
  quantity: 'speed',
  times: 1,
  colour: 'ink',
  width: 1.75,
};
const DIAMETER: Line = {
  name: 'radiusM',
  label: 'roll',
  quantity: 'diameter',
  times: 2,
  colour: 'muted',
  width: 1.25,
  dash: [3, 3],
  scale: 'diameter',
};

/** Three plots on one time axis, drawn from a scene; buffers are kept from frame to frame. */
export class TrendPlots {
  private readonly plots: uPlot[];
  private readonly lines: readonly (readonly Line[])[];
  private readonly buffers = new Map<TraceColumn, PointBuffer>();
  private readonly seconds = new Float64Array(MOST_POINTS);
  private points = 0;

  constructor(
    hosts: readonly HTMLElement[],
    private scene: TrendScene,
    private readonly palette: () => Palette,
    onCursor: (seconds: number | null) => void,
  ) {
    this.lines = [
      [SET_POINT, ...(scene.showsTruth ? [TRUTH] : []), MEASURED],
      [OUTPUT],
      [SPEED, DIAMETER],
    ];
    const specs = this.specs();
    this.plots = hosts.map((host, place) => makePlot(specs[place]!, host, palette, onCursor));
  }

  setSize(width: number, height: number): void {
    this.plots.forEach((plot, place) =>
      plot.setSize({width, height: Math.round(height * SHARES[place]!)}),
    );
  }

  draw(scene: TrendScene): void {
    this.scene = scene;
    const first = Math.floor(scene.fromS / SAMPLE_S);
    const end = Math.ceil(scene.toS / SAMPLE_S) + 1;
    this.plots.forEach((plot, place) => {
      const series = this.lines[place]!.map((line) => this.valuesOf(line, first, end));
      plot.batch(() => {
        plot.setData([this.seconds.subarray(0, this.points), ...series], false);
        plot.setScale('x', {min: scene.fromS, max: scene.toS});
      });
    });
  }

  destroy(): void {
    for (const plot of this.plots) plot.destroy();
  }

  /** Values of a trace in the person's unit; leaves the times in `seconds`, alike for every trace. */
  private valuesOf(line: Line, first: number, end: number): Float64Array {
    let buffer = this.buffers.get(line.name);
    if (buffer === undefined) {
      buffer = {rows: new Float64Array(MOST_POINTS), values: new Float64Array(MOST_POINTS)};
      this.buffers.set(line.name, buffer);
    }
    const {trace, units} = this.scene;
    const count = trace.fill(line.name, first, end, buffer);
    const offset = toPerson(line.quantity, 0, units);
    const factor = (toPerson(line.quantity, 1, units) - offset) * line.times;
    const {rows, values} = buffer;
    for (let place = 0; place < count; place++) {
      values[place] = values[place]! * factor + offset;
      this.seconds[place] = rows[place]! * SAMPLE_S;
    }
    this.points = count;
    return values.subarray(0, count);
  }

  private shown(quantity: Quantity, si: number): number {
    return toPerson(quantity, si, this.scene.units);
  }

  private specs(): PlotSpec[] {
    const rightPx = (): number => (this.scene.namesTraces ? NAMES_PX : BARE_PX);
    const marks = (plot: uPlot, place: number): void => {
      drawMarks(plot, this.scene.marks, this.palette(), place === 0);
      if (this.scene.namesTraces) drawNames(plot, this.names(place));
    };
    return [
      {
        lines: this.lines[0]!,
        range: () => [0, this.shown('tension', this.topN())],
        showsTime: false,
        topPx: STRIP_PX + 4,
        rightPx,
        drawBelow: (plot) => this.drawBand(plot),
        drawAbove: (plot) => {
          drawPhases(plot, this.scene.phases, this.palette());
          marks(plot, 0);
          drawNumbers(plot, this.scene.numbers, this.palette(), (tick) =>
            this.shown('tension', this.scene.trace.at(tick, 'tensionN')),
          );
        },
      },
      {
        lines: this.lines[1]!,
        range: () => [0, 100],
        showsTime: false,
        topPx: 10,
        rightPx,
        drawAbove: (plot) => marks(plot, 1),
      },
      {
        lines: this.lines[2]!,
        range: () => [0, this.shown('speed', this.scene.topSpeedMps)],
        diameterRange: () => [0, this.shown('diameter', 2.1 * this.scene.largestRadiusM)],
        showsTime: true,
        topPx: 10,
        rightPx,
        drawAbove: (plot) => marks(plot, 2),
      },
    ];
  }

  private drawBand(plot: uPlot): void {
    const {band} = this.scene;
    if (band === null) return;
    const lowest = this.shown('tension', band.lowest);
    drawBand(plot, {lowest, highest: this.shown('tension', band.highest)}, this.palette());
  }

  private names(place: number): TraceName[] {
    if (this.points === 0) return [];
    const last = this.points - 1;
    const row = Math.min(this.scene.trace.count - 1, Math.round(this.scene.toS / SAMPLE_S));
    return this.lines[place]!.map((line) => ({
      text:
        line === DIAMETER
          ? `${line.label} ${written('diameter', 2 * this.scene.trace.at(row, 'radiusM'), this.scene.units)}`
          : line.label,
      colour: this.palette()[line.colour],
      x: this.seconds[last]!,
      y: this.buffers.get(line.name)!.values[last]!,
      scale: line.scale ?? 'y',
    }));
  }

  /** The top of the tension scale [N]: given, or what is seen in the window with some air. */
  private topN(): number {
    if (this.scene.topN !== null) return this.scene.topN;
    let highest = 1;
    for (const {name} of this.lines[0]!) {
      const values = this.buffers.get(name)?.values.subarray(0, this.points) ?? [];
      for (const value of values) highest = Math.max(highest, value);
    }
    const offset = this.shown('tension', 0);
    return (1.15 * (highest - offset)) / (this.shown('tension', 1) - offset);
  }
}
