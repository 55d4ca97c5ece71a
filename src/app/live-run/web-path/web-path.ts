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
  viewChild,
} from '@angular/core';
import {type Phase, type RunView} from '#sim-core/index';
import {formatted, type Quantity, type UnitSystem} from '#shared/units';
import {type LiveRun} from '../live-run';
import {type Drawn, draw, type StandShape} from './web-drawing';
import {NARROW, WIDE} from './layout';

/** Below this width [px] labels go under the drawing. */
const NARROW_BELOW_PX = 720;
const CIRCLE_R = 20;

interface Label {
  readonly key: string;
  readonly x: number;
  readonly y: number;
  readonly anchor: 'start' | 'middle' | 'end';
  readonly number: string;
  readonly unit: string;
  readonly name: string;
  readonly tone: 'ink' | 'measured' | 'out';
}

/** The stand as a drawing that lives: it moves from the run's frames, its numbers follow five times a second. */
@Component({
  selector: 'app-web-path',
  templateUrl: './web-path.html',
  styleUrl: './web-path.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WebPath {
  readonly run = input.required<LiveRun>();
  readonly shape = input.required<StandShape>();
  readonly units = input<UnitSystem>('si');
  /** Whether the true web tension may be seen; exercises hide it. */
  readonly showsTruth = input(false);
  /** Band around the target [N]; a reading outside it is marked. */
  readonly band = input<{readonly lowest: number; readonly highest: number} | null>(null);

  private readonly host = inject<ElementRef<HTMLElement>>(ElementRef);
  private readonly rollGroup = viewChild.required<ElementRef<SVGGElement>>('roll');
  private readonly body = viewChild.required<ElementRef<SVGCircleElement>>('body');
  private readonly core = viewChild.required<ElementRef<SVGCircleElement>>('core');
  private readonly laps = viewChild.required<ElementRef<SVGGElement>>('laps');
  private readonly mark = viewChild.required<ElementRef<SVGLineElement>>('mark');
  private readonly web = viewChild.required<ElementRef<SVGPathElement>>('web');
  private readonly brakeArc = viewChild.required<ElementRef<SVGCircleElement>>('brakeArc');
  private readonly wheels = viewChild.required<ElementRef<SVGGElement>>('wheels');

  private readonly width = signal(1200);
  protected readonly layout = computed(() => (this.width() < NARROW_BELOW_PX ? NARROW : WIDE));
  protected readonly lapRings = Array.from({length: 9}, (_, place) => (place + 1) / 10);
  protected readonly arcLength = 2 * Math.PI * CIRCLE_R;
  protected readonly labels = computed(() => this.labelsOf(this.run().readOuts()));
  protected readonly heat = computed(() => heatShare(this.run().readOuts()?.brakeC ?? 25));
  protected readonly words = computed(() =>
    describe(this.run().phase(), this.run().outcome().kind),
  );

  private travelledM = 0;
  private lastS = 0;
  private lastDrawn: Drawn | null = null;

  constructor() {
    const observer = new ResizeObserver(([entry]) => {
      if (entry !== undefined) this.width.set(entry.contentRect.width);
    });
    observer.observe(this.host.nativeElement);
    inject(DestroyRef).onDestroy(() => observer.disconnect());

    effect((onCleanup) => {
      this.layout(); // draws anew when the layout or the stand changes
      this.shape();
      const stop = this.run().onFrame((view) => this.show(view));
      onCleanup(stop);
    });
  }

  private show(view: RunView): void {
    const layout = this.layout();
    const drawn = draw(layout, this.shape(), view, this.run().outcome().kind === 'webBroke');
    const last = this.lastDrawn;
    const {x, y} = layout.roll;
    this.rollGroup().nativeElement.setAttribute(
      'transform',
      `translate(${x} ${y}) rotate(${drawn.rollDeg.toFixed(2)})`,
    );
    if (last?.rollR !== drawn.rollR) this.showSize(drawn);
    if (last?.web !== drawn.web) this.web().nativeElement.setAttribute('d', drawn.web);
    this.web().nativeElement.style.strokeWidth = drawn.webWidth.toFixed(2);
    this.brakeArc().nativeElement.style.strokeDasharray = `${drawn.brakeShare * 0.75 * this.arcLength} ${this.arcLength}`;
    this.turnWheels(view);
    this.lastDrawn = drawn;
  }

  private showSize({rollR, coreR}: Drawn): void {
    this.body().nativeElement.setAttribute('r', rollR.toFixed(2));
    this.core().nativeElement.setAttribute('r', coreR.toFixed(2));
    this.mark().nativeElement.setAttribute('y2', (-rollR).toFixed(2));
    [...this.laps().nativeElement.children].forEach((ring, place) => {
      const r = coreR + (rollR - coreR) * this.lapRings[place]!;
      ring.setAttribute('r', r.toFixed(2));
    });
  }

  private turnWheels(view: RunView): void {
    const elapsedS = view.tS - this.lastS;
    this.lastS = view.tS;
    if (elapsedS < 0)
      this.travelledM = 0; // started again
    else this.travelledM += view.lineMps * elapsedS;
    const scale = this.layout().fullRollR / this.shape().fullRadiusM;
    for (const wheel of this.wheels().nativeElement.children) {
      const r = Number(wheel.getAttribute('data-r')) || 1; // not laid out yet
      const way = wheel.getAttribute('data-way') === 'under' ? -1 : 1;
      const deg = ((this.travelledM * scale) / r) * (180 / Math.PI) * way;
      wheel.lastElementChild?.setAttribute('transform', `rotate(${(deg % 360).toFixed(1)})`);
    }
  }

  private labelsOf(view: RunView | null): Label[] {
    if (view === null) return [];
    const {labels} = this.layout();
    const make = (
      place: keyof typeof labels,
      quantity: Quantity,
      si: number,
      name: string,
      tone: Label['tone'] = 'ink',
    ): Label => ({
      key: place,
      ...labels[place],
      ...formatted(quantity, si, this.units()),
      name,
      tone,
    });

    const brakeC = formatted('temperature', view.brakeC, this.units());
    const shown = [
      make('brake', 'percent', view.outputPct, `brake, ${brakeC.number} ${brakeC.unit}`),
      make('diameter', 'diameter', 2 * view.radiusM, 'roll diameter'),
      make('tension', 'tension', view.sampleN, 'measured tension', this.toneOf(view)),
      make('speed', 'speed', view.lineMps, 'line speed'),
    ];
    if (this.showsTruth()) shown.push(make('truth', 'tension', view.tensionN, 'true web tension'));
    return shown;
  }

  private toneOf({sampleN, lineMps}: RunView): Label['tone'] {
    const band = this.band();
    const isOut = band !== null && lineMps > 0 && (sampleN < band.lowest || sampleN > band.highest);
    return isOut ? 'out' : 'measured';
  }
}

/** 0 at room temperature, 1 at 150 °C: how far the brake's colour has gone to hot. */
function heatShare(brakeC: number): number {
  return Math.max(0, Math.min(1, (brakeC - 40) / 110));
}

function describe(phase: Phase, outcome: string): string {
  if (outcome === 'webBroke') return 'Unwind stand. The web is broken.';
  if (outcome === 'rollEmpty') return 'Unwind stand. The roll is empty.';
  return `Unwind stand: braked roll, idler, load-cell roller, idler, nip. Phase: ${phase}.`;
}
