import uPlot from 'uplot';
import {type Palette} from './palette';

/** One of the plots that stand one under the other on one time axis. */
export interface PlotSpec {
  readonly lines: readonly {
    readonly colour: keyof Palette;
    readonly width: number;
    readonly dash?: number[];
    readonly scale?: 'y' | 'right';
  }[];
  readonly range: () => readonly [number, number];
  readonly rightRange?: () => readonly [number, number];
  readonly showsTime: boolean;
  /** Room above the plot for the phases [px]. */
  readonly topPx: number;
  readonly drawBelow?: (plot: uPlot) => void;
  readonly drawAbove?: (plot: uPlot) => void;
}

/** uPlot's number for the right-hand side; its type is a const enum that types alone carry. */
const uPlotRight = 1 as uPlot.Axis.Side;
/** Room for the numbers of an axis [px]; the same in every plot, so that times stand under each other. */
const AXIS_PX = 46;

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
  return new uPlot(
    {
      width: 100,
      height: 100,
      legend: {show: false},
      padding: [spec.topPx, spec.rightRange ? 0 : AXIS_PX, spec.showsTime ? 0 : 8, 0],
      cursor: {sync: {key: 'trend'}, drag: {x: false, y: false}, points: {show: false}},
      scales: {
        x: {time: false},
        y: {range: () => [...spec.range()] as [number, number]},
        ...(spec.rightRange
          ? {right: {range: () => [...spec.rightRange!()] as [number, number]}}
          : {}),
      },
      axes: [
        {
          ...axis,
          show: spec.showsTime,
          size: 26,
          values: (_plot, ticks) => ticks.map((t) => `${t} s`),
        },
        {...axis},
        ...(spec.rightRange
          ? [{...axis, scale: 'right', side: uPlotRight, grid: {show: false}}]
          : []),
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
        drawClear: [(plot) => spec.drawBelow?.(plot)],
        draw: [(plot) => spec.drawAbove?.(plot)],
        setCursor: [
          (plot) =>
            onCursor(
              plot.cursor.left === undefined || plot.cursor.left < 0
                ? null
                : plot.posToVal(plot.cursor.left, 'x'),
            ),
        ],
      },
    },
    [[], ...spec.lines.map(() => [])],
    host,
  );
}
