import {
  afterRenderEffect,
  ChangeDetectionStrategy,
  Component,
  computed,
  DestroyRef,
  ElementRef,
  inject,
  input,
  signal,
  viewChild,
} from '@angular/core';
import {type Phase, type RunView} from '#sim-core/index';
import {type UnitSystem} from '#shared/units';
import {phaseWord} from '#shared/wording/run';
import {type LiveRun} from '../live-run';
import {layoutFor} from './layout';
import {standingParts} from './standing-parts';
import {valuesOf} from './values';
import {type Drawn, draw, type StandShape} from './web-drawing';

/** Time the ends of a broken web take to come down [ms]. */
const FALL_MS = 700;
/** The brake's arc at full output [degrees]. */
const ARC_DEG = 240;

/** The stand as a drawing that lives: it moves from the run's frames, its numbers follow five times a second. */
@Component({
  selector: 'app-web-path',
  templateUrl: './web-path.html',
  styleUrl: './web-path.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
  host: {'[class.narrow]': 'layout().isNarrow'},
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
  private readonly sheen = viewChild.required<ElementRef<SVGPathElement>>('sheen');
  private readonly chalk = viewChild.required<ElementRef<SVGPathElement>>('chalk');
  private readonly web = viewChild.required<ElementRef<SVGPathElement>>('web');
  private readonly disc = viewChild.required<ElementRef<SVGCircleElement>>('disc');
  private readonly brakeArc = viewChild.required<ElementRef<SVGCircleElement>>('brakeArc');
  private readonly wheels = viewChild.required<ElementRef<SVGGElement>>('wheels');

  private readonly width = signal(1000);
  protected readonly layout = computed(() => layoutFor(this.width()));
  protected readonly standing = computed(() =>
    standingParts(this.layout(), this.scale() * this.shape().coreRadiusM),
  );
  protected readonly labels = computed(() => {
    const view = this.run().readOuts();
    if (view === null) return [];
    const values = valuesOf(view, {
      units: this.units(),
      showsTruth: this.showsTruth(),
      band: this.band(),
    });
    return values.map((value) => ({...value, ...this.layout().labels[value.key]}));
  });
  protected readonly discColour = computed(() => {
    const percent = 100 * heatShare(this.run().readOuts()?.brakeC ?? 25);
    return `color-mix(in srgb, var(--hot) ${percent.toFixed(0)}%, var(--line))`;
  });
  protected readonly words = computed(() =>
    describe(this.run().phase(), this.run().outcome().kind),
  );

  private readonly scale = computed(() => this.layout().fullRollR / this.shape().fullRadiusM);
  private readonly isStill = matchMedia('(prefers-reduced-motion: reduce)');
  private travelledM = 0;
  private lastS = 0;
  private last: Drawn | null = null;
  private brokeAtMs: number | null = null;

  constructor() {
    // In a frame of its own: what follows may change the size again, which the observer would complain about.
    const observer = new ResizeObserver(([entry]) =>
      requestAnimationFrame(() => {
        if (entry !== undefined) this.width.set(Math.round(entry.contentRect.width));
      }),
    );
    observer.observe(this.host.nativeElement);
    inject(DestroyRef).onDestroy(() => observer.disconnect());

    // After the render: it sizes laps that the template has just laid out.
    afterRenderEffect((onCleanup) => {
      this.standing(); // draws anew when the layout or the stand changes
      this.last = null;
      const stop = this.run().onFrame((view) => this.show(view));
      onCleanup(stop);
    });
  }

  private show(view: RunView): void {
    const isBroken = this.run().outcome().kind === 'webBroke';
    const drawn = draw(this.layout(), this.shape(), view, isBroken, this.fallen(isBroken));
    if (this.last?.rollR !== drawn.rollR) this.showSize(drawn);
    if (this.last?.web !== drawn.web) this.web().nativeElement.setAttribute('d', drawn.web);
    this.web().nativeElement.style.strokeWidth = drawn.webWidth.toFixed(2);
    const arc = (drawn.brakeShare * ARC_DEG).toFixed(1);
    this.brakeArc().nativeElement.setAttribute('stroke-dasharray', `${arc} 360`);
    if (!this.isStill.matches) this.turn(drawn, view);
    this.last = drawn;
  }

  private showSize({rollR, coreR, brakeR}: Drawn): void {
    const size = rollR.toFixed(2);
    this.body().nativeElement.setAttribute('r', size);
    this.core().nativeElement.setAttribute('r', coreR.toFixed(2));
    this.disc().nativeElement.setAttribute('r', brakeR.toFixed(2));
    this.brakeArc().nativeElement.setAttribute('r', brakeR.toFixed(2));
    this.sheen().nativeElement.setAttribute('d', wedge(rollR, -2.3, 0.5) + wedge(rollR, 0.85, 0.5));
    // Chalk across the roll's side, as it is drawn to see whether the laps slip.
    const [edge, inner] = [rollR - 1.5, coreR + 2];
    this.chalk().nativeElement.setAttribute(
      'd',
      `M0 ${-inner}V${-edge}M0 ${inner}V${edge * 0.35 + inner * 0.65}`,
    );
    const laps = this.body().nativeElement.nextElementSibling?.children ?? [];
    for (const ring of laps) {
      const isSeen = Number(ring.getAttribute('r')) < rollR - 1;
      ring.setAttribute('visibility', isSeen ? 'visible' : 'hidden');
    }
  }

  private turn({rollDeg}: Drawn, view: RunView): void {
    this.rollGroup().nativeElement.setAttribute('transform', `rotate(${rollDeg.toFixed(2)})`);
    const elapsedS = view.tS - this.lastS;
    this.lastS = view.tS;
    if (elapsedS < 0)
      this.travelledM = 0; // started again
    else this.travelledM += view.lineMps * elapsedS;
    for (const wheel of this.wheels().nativeElement.children) {
      const r = Number(wheel.getAttribute('data-r')) || 1; // not laid out yet
      const way = wheel.getAttribute('data-way') === 'under' ? -1 : 1;
      const deg = ((this.travelledM * this.scale()) / r) * (180 / Math.PI) * way;
      wheel.lastElementChild?.setAttribute('transform', `rotate(${(deg % 360).toFixed(1)})`);
    }
  }

  /** How far the ends of a broken web have come down; asks for frames of its own, as the run is over. */
  private fallen(isBroken: boolean): number {
    if (!isBroken) {
      this.brokeAtMs = null;
      return 0;
    }
    if (this.isStill.matches) return 1;
    this.brokeAtMs ??= performance.now();
    const share = Math.min(1, (performance.now() - this.brokeAtMs) / FALL_MS);
    if (share < 1) {
      requestAnimationFrame(() => {
        const {view} = this.run();
        if (view !== null) this.show(view);
      });
    }
    return 1 - (1 - share) * (1 - share);
  }
}

/** A slice of the roll's side on which light lies. */
function wedge(r: number, fromRad: number, widthRad: number): string {
  const x = (rad: number): string => (r * Math.cos(rad)).toFixed(2);
  const y = (rad: number): string => (r * Math.sin(rad)).toFixed(2);
  const toRad = fromRad + widthRad;
  return `M0 0L${x(fromRad)} ${y(fromRad)}A${r} ${r} 0 0 1 ${x(toRad)} ${y(toRad)}Z`;
}

/** 0 at room temperature, 1 at 150 °C: how far the disc's colour has gone to hot. */
function heatShare(brakeC: number): number {
  return Math.max(0, Math.min(1, (brakeC - 30) / 120));
}

function describe(phase: Phase, outcome: string): string {
  if (outcome === 'webBroke') return 'Unwind stand. The web is broken.';
  if (outcome === 'rollEmpty') return 'Unwind stand. The roll is empty.';
  return `Unwind stand: braked roll, idler, load-cell roller, idler, nip. Phase: ${phaseWord(phase)}.`;
}
