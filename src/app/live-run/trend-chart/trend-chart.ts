import {
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  effect,
  ElementRef,
  inject,
  input,
  linkedSignal,
  signal,
  untracked,
  viewChildren,
} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {MatButtonToggleModule} from '@angular/material/button-toggle';
import {type TraceColumn} from '#sim-core/index';
import {formatted, type Quantity, toPerson, unitName, type UnitSystem} from '#shared/units';
import type uPlot from 'uplot';
import {type LiveRun} from '../live-run';
import {onThemeChange, type Palette, readPalette} from './palette';
import {
  drawBand,
  drawMarks,
  drawNumbers,
  drawPhases,
  marksOf,
  type PlaceNumber,
} from './trend-marks';
import {makePlot, type PlotSpec} from './trend-plots';

const SAMPLE_S = 0.01;
/** More points than pixels help nobody. */
const MOST_POINTS = 1600;
const HEIGHTS_PX = [190, 96, 112] as const;
const NARROW_HEIGHTS_PX = [150, 76, 92] as const;

/** Tension, brake output and line speed on one time axis, live; holds still on request to look back. */
@Component({
  selector: 'app-trend-chart',
  templateUrl: './trend-chart.html',
  styleUrl: './trend-chart.scss',
  imports: [MatButtonModule, MatButtonToggleModule],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class TrendChart {
  readonly run = input.required<LiveRun>();
  readonly units = input<UnitSystem>('si');
  readonly showsTruth = input(false);
  /** Tolerance around the target [N]. */
  readonly band = input<{readonly lowest: number; readonly highest: number} | null>(null);
  /** Tension that fills the plot on the fixed scale [N]. */
  readonly topN = input.required<number>();
  readonly largestRadiusM = input.required<number>();
  /** Numbered places on the tension trace. */
  readonly numbers = input<readonly PlaceNumber[]>([]);
  /** Length of the window at first [s]; `all` shows the whole run. */
  readonly firstWindowS = input<number | 'all'>(60);

  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);
  private readonly hosts = viewChildren<ElementRef<HTMLElement>>('plot');

  protected readonly windowS = linkedSignal(() => {
    const first = this.firstWindowS();
    return first === 'all' ? Math.max(10, Math.ceil(this.run().trace.count * SAMPLE_S)) : first;
  });
  protected readonly isAutoScale = signal(false);
  /** End of the window while it is held [s]; null follows the run. */
  protected readonly heldEndS = signal<number | null>(null);
  protected readonly cursorS = signal<number | null>(null);
  protected readonly runLengthS = computed(() => this.run().readOuts()?.tS ?? 0);
  protected readonly marks = computed(() =>
    marksOf(this.run().entries(), this.run().events(), this.units()),
  );
  protected readonly readings = computed(() => {
    const atS = this.cursorS() ?? this.runLengthS();
    const row = Math.min(this.run().trace.count - 1, Math.round(atS / SAMPLE_S));
    return {
      isCursor: this.cursorS() !== null,
      time: `${Math.max(0, row * SAMPLE_S).toFixed(1)} s`,
      values: this.columns().map((column) => ({
        ...column,
        ...formatted(
          column.quantity,
          this.run().trace.at(row, column.name) * (column.quantity === 'diameter' ? 2 : 1),
          this.units(),
        ),
      })),
    };
  });
  private readonly columns = computed(() => {
    const all: {name: TraceColumn; label: string; quantity: Quantity; tone: keyof Palette}[] = [
      {name: 'measuredN', label: 'measured', quantity: 'tension', tone: 'measured'},
      {name: 'setPointN', label: 'set point', quantity: 'tension', tone: 'pine'},
      {name: 'outputPct', label: 'brake output', quantity: 'percent', tone: 'output'},
      {name: 'lineMps', label: 'line speed', quantity: 'speed', tone: 'ink'},
      {name: 'radiusM', label: 'diameter', quantity: 'diameter', tone: 'muted'},
    ];
    if (this.showsTruth()) {
      all.unshift({name: 'tensionN', label: 'true tension', quantity: 'tension', tone: 'ink'});
    }
    return all;
  });

  private plots: uPlot[] = [];
  private palette: Palette | null = null;
  private isOddFrame = false;
  private topSpeedMps = 1;
  private observedTopN = 0;

  constructor() {
    const destroyed = inject(DestroyRef);
    effect((onCleanup) => {
      if (this.hosts().length < 3) return;
      this.showsTruth();
      untracked(() => this.build());
      onCleanup(() => this.dropPlots());
    });
    effect((onCleanup) => {
      const stop = this.run().onFrame(() => this.drawLive());
      onCleanup(stop);
    });
    effect(() => {
      this.windowS();
      this.isAutoScale();
      this.heldEndS();
      this.band();
      this.marks();
      this.numbers();
      this.units();
      untracked(() => this.draw());
    });

    const observer = new ResizeObserver(() => this.fit());
    observer.observe(this.host.nativeElement);
    const stopTheme = onThemeChange(() => {
      this.palette = null;
      this.draw();
    });
    destroyed.onDestroy(() => {
      observer.disconnect();
      stopTheme();
    });
  }

  protected hold(isHeld: boolean): void {
    this.heldEndS.set(isHeld ? Math.max(this.windowS(), this.runLengthS()) : null);
  }

  protected moveTo(endS: number): void {
    this.heldEndS.set(endS);
  }

  protected unitOf(quantity: Quantity): string {
    return unitName(quantity, this.units());
  }

  private colours = (): Palette => (this.palette ??= readPalette(this.host.nativeElement));

  private build(): void {
    this.dropPlots();
    const specs = this.specs();
    this.plots = this.hosts().map((host, place) =>
      makePlot(specs[place]!, host.nativeElement, this.colours, (seconds) =>
        this.cursorS.set(seconds),
      ),
    );
    this.fit();
  }

  private specs(): PlotSpec[] {
    const shown = (quantity: Quantity, si: number): number => toPerson(quantity, si, this.units());
    const tension: PlotSpec = {
      lines: [
        {colour: 'pine', width: 1.5, dash: [6, 4]},
        {colour: 'measured', width: 1.75},
        ...(this.showsTruth() ? [{colour: 'ink' as const, width: 1.75}] : []),
      ],
      range: () => [0, shown('tension', this.isAutoScale() ? this.observedTopN : this.topN())],
      showsTime: false,
      topPx: 22,
      drawBelow: (plot) => {
        const band = this.band();
        if (band === null) return;
        const {lowest, highest} = band;
        drawBand(
          plot,
          {lowest: shown('tension', lowest), highest: shown('tension', highest)},
          this.colours(),
        );
      },
      drawAbove: (plot) => {
        drawPhases(plot, this.run().trace, SAMPLE_S, this.colours());
        drawMarks(plot, this.marks(), SAMPLE_S, this.colours(), true);
        drawNumbers(plot, this.numbers(), SAMPLE_S, this.colours(), (tick) =>
          shown('tension', this.run().trace.at(tick, 'tensionN')),
        );
      },
    };
    const marksOnly = (plot: uPlot): void =>
      drawMarks(plot, this.marks(), SAMPLE_S, this.colours(), false);
    return [
      tension,
      {
        lines: [{colour: 'output', width: 1.75}],
        range: () => [0, 100],
        showsTime: false,
        topPx: 10,
        drawAbove: marksOnly,
      },
      {
        lines: [
          {colour: 'ink', width: 1.75},
          {colour: 'muted', width: 1.25, dash: [3, 3], scale: 'right'},
        ],
        range: () => [0, shown('speed', this.topSpeedMps)],
        rightRange: () => [0, shown('diameter', 2.2 * this.largestRadiusM())],
        showsTime: true,
        topPx: 10,
        drawAbove: marksOnly,
      },
    ];
  }

  private drawLive(): void {
    this.isOddFrame = !this.isOddFrame; // 30 drawings a second are enough for the eye
    if (this.isOddFrame || this.heldEndS() !== null) return;
    this.draw();
  }

  private draw(): void {
    if (this.plots.length < 3) return;
    const {trace} = this.run();
    const nowS = trace.count * SAMPLE_S;
    const windowS = this.windowS();
    const endS = this.heldEndS() ?? Math.max(windowS, nowS);
    const first = Math.floor((endS - windowS) / SAMPLE_S);
    const last = Math.ceil(endS / SAMPLE_S);
    const get = (name: TraceColumn, quantity: Quantity, times = 1): number[] =>
      trace
        .points(name, first, last, MOST_POINTS)
        .values.map((value) => toPerson(quantity, value * times, this.units()));

    const rows = trace.points('tensionN', first, last, MOST_POINTS).rows;
    const seconds = rows.map((row) => row * SAMPLE_S);
    this.measureRanges(first, last);
    const tensions = [get('setPointN', 'tension'), get('measuredN', 'tension')];
    if (this.showsTruth()) tensions.push(get('tensionN', 'tension'));
    const data: uPlot.AlignedData[] = [
      [seconds, ...tensions],
      [seconds, get('outputPct', 'percent')],
      [seconds, get('lineMps', 'speed'), get('radiusM', 'diameter', 2)],
    ];
    this.plots.forEach((plot, place) => {
      plot.batch(() => {
        plot.setData(data[place]!, false);
        plot.setScale('x', {min: endS - windowS, max: endS});
      });
    });
  }

  /** Ranges only ever step up while a run goes on: a scale that breathes cannot be read. */
  private measureRanges(first: number, last: number): void {
    const {trace} = this.run();
    const highest = (name: TraceColumn): number =>
      Math.max(0, ...trace.points(name, first, last, 400).values);
    const speed = Math.max(highest('lineMps'), this.run().view?.lineTargetMps ?? 0);
    this.topSpeedMps = Math.max(1, Math.ceil(speed * 1.1));
    this.observedTopN = 1.15 * Math.max(1, highest('tensionN'), highest('setPointN'));
  }

  private fit(): void {
    const width = this.host.nativeElement.clientWidth;
    const heights = width < 600 ? NARROW_HEIGHTS_PX : HEIGHTS_PX;
    this.plots.forEach((plot, place) => plot.setSize({width, height: heights[place]!}));
    this.draw();
  }

  private dropPlots(): void {
    for (const plot of this.plots) plot.destroy();
    this.plots = [];
  }
}
