import uPlot from 'uplot';
import {type Palette} from './palette';

/** One of the plots that stand one under the other on one time axis. */
export interface PlotSpec {
  readonly lines: readonly {
    readonly colour: keyof Palette;
    readonly width: number;
    readonly dash?: number[];
    readonly scale?: 'y' | 'diameter';
  }[];
  readonly range: () => readonly [number, number];
  readonly diameterRange?: () => readonly [number, number];
  readonly showsTime: boolean;
  /** Room above the plot [px]. */
  readonly topPx: number;
  /** Room beside the plot for the traces' names [px]. */
  readonly rightPx: () => number;
  readonly drawBelow?: (plot: uPlot) => void;
  readonly drawAbove?: (plot: uPlot) => void;
}

/** Room for the numbers of an axis [px]; the same in every plot, so that times stand under each other. */
export const AXIS_PX = 44;

/** Makes a plot whose colours are asked for at each drawing, so that a change of theme only needs a redraw. */
export function makePlot(
  spec: PlotSpec,
  host: HTMLElement,
  palette: () => Palette,
  onCursor: (seconds: number | null) => void,
): uPlot {
  const grid = {stroke: () => palette().rule, width: 1};
  const font = '12px "Atkinson Hyperlegible Mono Variable", monospace';
  const axis = {stroke: () => palette().muted, font, grid, ticks: {show: false}, size: AXIS_PX};
  const plot = new uPlot(
    {
      width: 100,
      height: 100,
      legend: {show: false},
      padding: [spec.topPx, () => spec.rightPx(), spec.showsTime ? 0 : 8, 0],
      cursor: {sync: {key: 'trend'}, y: false, drag: {x: false, y: false}, points: {show: false}},
      scales: {
        x: {time: false},
        y: {range: () => [...spec.range()]},
        ...(spec.diameterRange ? {diameter: {range: () => [...spec.diameterRange!()]}} : {}),
      },
      axes: [
        {
          ...axis,
          show: spec.showsTime,
          grid: {show: false},
          size: 26,
          space: 70,
          values: (_plot, ticks) => ticks.map((seconds) => `${seconds} s`),
        },
        {...axis, space: 26, gap: 6},
      ],
      series: [
        {},
        ...spec.lines.map((line) => ({
          stroke: () => palette()[line.colour],
          width: line.width,
          scale: line.scale ?? 'y',
          points: {show: false},
          ...(line.dash ? {dash: line.dash} : {}),
        })),
      ],
      hooks: {
        drawClear: [(made) => spec.drawBelow?.(made)],
        draw: [(made) => spec.drawAbove?.(made)],
        setCursor: [
          (made) => {
            const {left} = made.cursor;
            onCursor(left === undefined || left < 0 ? null : made.posToVal(left, 'x'));
          },
        ],
      },
    },
    [[], ...spec.lines.map(() => [])],
    host,
  );
  const line = plot.over.querySelector<HTMLElement>('.u-cursor-x');
  if (line !== null) line.style.borderColor = 'var(--ink)';
  return plot;
}
