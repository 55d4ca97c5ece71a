import {
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  effect,
  ElementRef,
  inject,
  input,
  signal,
  untracked,
  viewChild,
  viewChildren,
} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {MatButtonToggleModule} from '@angular/material/button-toggle';
import {type Quantity, unitName, type UnitSystem} from '#shared/units';
import {type LiveRun} from '../live-run';
import {listenForLookBack} from './look-back';
import {AXIS_PX} from './make-plot';
import {onThemeChange, type Palette, readPalette} from './palette';
import {readingsAt} from './readings';
import {marksOf, type PlaceNumber} from './trend-marks';
import {TrendPlots} from './trend-plots';
import {SAMPLE_S} from '../sample-period';
import {phaseSpans, type TrendScene} from './trend-scene';

/** Below this width [px] traces have no names beside them: the readings name them. */
const NAMES_FROM_PX = 620;
/** Least time between two live drawings [ms]: 30 a second are enough for the eye. */
const DRAW_EVERY_MS = 30;
const LEAST_WINDOW_S = 10;

/** Tension, brake output and line speed on one time axis, live; drag it to look back while the run goes on. */
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
  private readonly area = viewChild.required<ElementRef<HTMLElement>>('area');
  private readonly hosts = viewChildren<ElementRef<HTMLElement>>('plot');

  private readonly chosenLength = signal<number | 'all' | null>(null);
  protected readonly windowLength = computed(() => this.chosenLength() ?? this.firstWindowS());
  protected readonly isAutoScale = signal(false);
  /** End of the window while somebody looks back [s]; null follows the run. */
  protected readonly heldEndS = signal<number | null>(null);
  private readonly cursorS = signal<number | null>(null);
  protected readonly runLengthS = computed(() => this.run().readOuts()?.tS ?? 0);
  protected readonly windowS = computed(() => {
    const length = this.windowLength();
    return length === 'all' ? Math.max(LEAST_WINDOW_S, Math.ceil(this.runLengthS())) : length;
  });
  private readonly marks = computed(() =>
    marksOf(this.run().entries(), this.run().events(), this.units()),
  );
  private readonly phases = computed(() => phaseSpans(this.run().events(), this.run().trace));
  /** Values of all traces: under the cursor, else the newest. */
  protected readonly readings = computed(() => {
    const {trace} = this.run();
    const atS = this.cursorS() ?? this.heldEndS() ?? this.runLengthS();
    const row = Math.max(0, Math.min(trace.count - 1, Math.round(atS / SAMPLE_S)));
    return {
      time: `${(row * SAMPLE_S).toFixed(1)} s`,
      values: readingsAt(trace, row, this.units(), this.showsTruth()),
    };
  });

  private plots: TrendPlots | null = null;
  private palette: Palette | null = null;
  private lastDrawnMs = 0;
  private topSpeedMps = 1;
  private namesTraces = true;

  constructor() {
    const destroyed = inject(DestroyRef);
    effect((onCleanup) => {
      if (this.hosts().length < 3) return;
      this.showsTruth(); // another set of traces
      untracked(() => this.build());
      onCleanup(() => this.dropPlots());
    });
    effect((onCleanup) => {
      const stop = this.run().onFrame(() => this.drawLive());
      onCleanup(stop);
    });
    effect(() => {
      this.scene();
      this.runLengthS(); // a single step draws too
      untracked(() => this.draw());
    });
    effect((onCleanup) => {
      const stop = listenForLookBack(this.area().nativeElement, {
        secondsPerPx: () =>
          this.windowS() / Math.max(1, this.area().nativeElement.clientWidth - AXIS_PX),
        endS: () => this.endS(),
        moveTo: (endS) => this.moveTo(endS),
      });
      onCleanup(stop);
    });

    // In a frame of its own: a plot's new height may change the host's again.
    const observer = new ResizeObserver(() => requestAnimationFrame(() => this.fit()));
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

  /** Looks back to a window that ends here; the end of the run follows it again. */
  protected moveTo(endS: number): void {
    const newestS = Math.max(this.windowS(), this.runLengthS());
    this.heldEndS.set(endS >= newestS ? null : Math.max(this.windowS(), endS));
  }

  protected chooseLength(length: number | 'all'): void {
    this.chosenLength.set(length);
    this.heldEndS.set(null);
  }

  protected unitOf(quantity: Quantity): string {
    return unitName(quantity, this.units());
  }

  private readonly colours = (): Palette => (this.palette ??= readPalette(this.host.nativeElement));

  /** What follows from inputs and acts; the window moves with the run. */
  private readonly scene = computed(() => ({
    trace: this.run().trace,
    units: this.units(),
    showsTruth: this.showsTruth(),
    band: this.band(),
    topN: this.isAutoScale() ? null : this.topN(),
    largestRadiusM: this.largestRadiusM(),
    marks: this.marks(),
    numbers: this.numbers(),
    phases: this.phases(),
    windowS: this.windowS(),
    heldEndS: this.heldEndS(),
  }));

  /** Fastest that the log asks for [m/s]: a run that is taken up, or looked at, has its commands behind it. */
  private readonly askedMps = computed(() =>
    this.run()
      .entries()
      .reduce((fastest, entry) => {
        const isRun = entry.kind === 'line' && entry.line.command === 'run';
        return isRun ? Math.max(fastest, entry.line.speedMps) : fastest;
      }, 0),
  );

  private sceneNow(): TrendScene {
    const {windowS, ...scene} = this.scene();
    const toS = this.endS();
    // Only ever steps up while a run goes on: a scale that breathes cannot be read.
    const speedMps = Math.max(this.run().view?.lineTargetMps ?? 0, this.askedMps());
    if (scene.trace.count < 10) this.topSpeedMps = 1;
    this.topSpeedMps = Math.max(this.topSpeedMps, Math.ceil(1.2 * speedMps));
    return {
      ...scene,
      fromS: toS - windowS,
      toS,
      topSpeedMps: this.topSpeedMps,
      namesTraces: this.namesTraces,
    };
  }

  private endS(): number {
    return this.heldEndS() ?? Math.max(this.windowS(), this.run().trace.count * SAMPLE_S);
  }

  private build(): void {
    this.dropPlots();
    const hosts = this.hosts().map(({nativeElement}) => nativeElement);
    this.plots = new TrendPlots(hosts, this.sceneNow(), this.colours, (seconds) =>
      this.cursorS.set(seconds),
    );
    this.fit();
  }

  private drawLive(): void {
    const nowMs = performance.now();
    if (nowMs - this.lastDrawnMs < DRAW_EVERY_MS || this.heldEndS() !== null) return;
    this.draw();
  }

  private draw(): void {
    if (this.plots === null) return;
    this.lastDrawnMs = performance.now();
    this.plots.draw(this.sceneNow());
  }

  private fit(): void {
    const {clientWidth, clientHeight} = this.area().nativeElement;
    if (clientWidth === 0) return;
    this.namesTraces = clientWidth >= NAMES_FROM_PX;
    this.plots?.setSize(clientWidth, clientHeight);
    this.draw();
  }

  private dropPlots(): void {
    this.plots?.destroy();
    this.plots = null;
  }
}
