import {type Disturbance, type Scenario} from '../scenario/scenario';
import {decay} from '../signal/decay';
import {Drive} from './drive';
import {Line} from './line';
import * as at from './plant-state';
import {WebPath, withinTurn} from './web-path';

/** How often a step that crosses a bend is halved; the last halves count as "at the bend". */
const DEEPEST = 5;

/** Times closer than this are the same moment [s]. */
const SAME_S = 1e-12;

/** How the plant's run came to an end. */
export interface PlantEnd {
  readonly kind: 'webBroke' | 'rollEmpty';
  readonly atS: number;
  readonly tensionN: number;
}

/**
 * The plant over one control tick: fourth-order Runge–Kutta steps of the plant step's parts, cut where the
 * line's speed bends and halved where the equations bend (stick, slack, stops, knees of the curve). The
 * drive's lag is followed exactly. Speed beats form here; the state is the caller's typed array.
 */
export class Plant {
  readonly line: Line;
  readonly drive: Drive;
  readonly path: WebPath;
  /** How the run ended, once it has. */
  end: PlantEnd | null = null;

  private readonly y: Float64Array;
  private readonly lagS: number;
  private readonly hasFilter: boolean;
  private readonly hasCell: boolean;

  private readonly k1 = new Float64Array(at.INTEGRATED);
  private readonly k2 = new Float64Array(at.INTEGRATED);
  private readonly k3 = new Float64Array(at.INTEGRATED);
  private readonly k4 = new Float64Array(at.INTEGRATED);
  private readonly trial = new Float64Array(at.INTEGRATED);
  /** State and slope at the start of a step, one pair a depth of halving. */
  private readonly before = Array.from({length: DEEPEST + 1}, twoStates);
  /** States integrated: all nine only with a dancer or a roller with run-out. */
  private readonly count: number;

  private region = 0;
  private wanted = 0; // delayed command [%]
  private stepS = 0; // for which the two factors below hold
  private halfDecay = 1;
  private fullDecay = 1;

  static size(scenario: Scenario, grid: Grid): number {
    return (
      at.PLANT_SIZE +
      Drive.size(scenario.brake.deadTimeS ?? 0, grid.plantStepS, grid.stepsPerTick) +
      Line.size(scenario.lineRoundS ?? 0, grid.sampleS)
    );
  }

  constructor(
    scenario: Scenario,
    private readonly state: Float64Array,
    private readonly grid: Grid,
  ) {
    const {brake, span, sensing} = scenario;
    const deadTimeS = brake.deadTimeS ?? 0;
    const driveSize = Drive.size(deadTimeS, grid.plantStepS, grid.stepsPerTick);
    const driveEnd = at.PLANT_SIZE + driveSize;
    this.line = new Line(state.subarray(driveEnd), scenario.lineRoundS ?? 0);
    this.path = new WebPath(scenario, state, this.line, grid.plantStepS);
    this.drive = new Drive(
      state.subarray(at.PLANT_SIZE, driveEnd),
      this.path.brake,
      deadTimeS,
      grid.plantStepS,
      grid.stepsPerTick,
    );
    this.y = state.subarray(0, at.INTEGRATED);
    this.lagS = brake.lagS;
    this.hasCell = sensing.kind === 'loadCell';
    this.hasFilter = sensing.kind === 'loadCell' && sensing.filterS > 0;
    this.count = this.hasCell && (span.rollerRunoutM ?? 0) === 0 ? at.DANCER : at.INTEGRATED;
  }

  /** State at t = 0. */
  reset(standstillPct: number): void {
    this.path.reset();
    this.line.reset();
    this.drive.reset(standstillPct);
    this.state[at.DRIVE] = standstillPct;
  }

  disturb(values: Disturbance, lineStands: boolean): void {
    if (values.supply !== undefined) this.drive.supply = values.supply;
    this.path.disturb(values, lineStands);
  }

  /** Begins a tick, its commands and disturbances done: lays out the line's speed. */
  openTick(t: number): void {
    this.line.openTick(t, this.grid.sampleS);
    this.path.tickS = t;
    this.path.piece = 0;
    if (this.hasFilter || !this.hasCell) return;
    // no filter: the sample is the signal of this very moment
    this.path.slopes(this.y, this.k1, 0);
    this.y[at.FILTER] = this.path.signal(this.path.tensionN);
  }

  /** Moves the plant through the tick with this output and, for a dancer, this loading. */
  move(tick: number, outputPct: number, loadingN: number): void {
    const {path, grid, line, drive} = this;
    drive.command(tick, outputPct);
    path.loadingN = loadingN;
    const early = drive.early(tick);
    const late = drive.late(tick);
    this.setCommand(drive.changesAtStep > 0 ? early : late);
    path.piece = 0;
    this.look(0);
    if (this.ended(0)) return;

    const {parts} = path;
    const steps = grid.stepsPerTick * parts;
    const changesAt = drive.changesAtStep * parts;
    let from = 0;
    for (let step = 1; step <= steps; step++) {
      const to = (step * grid.sampleS) / steps;
      while (path.piece + 1 < line.pieces && line.ends[path.piece]! < to - SAME_S) {
        const bend = line.ends[path.piece]!;
        if (bend > from + SAME_S) {
          if (!this.step(from, bend - from, 0)) return;
          from = bend;
        }
        path.piece++;
        this.look(from);
      }
      if (!this.step(from, to - from, 0)) return;
      from = to;
      if (step === changesAt && early !== late) {
        this.setCommand(late);
        this.look(from);
      }
    }
    this.close();
  }

  private setCommand(wantedPct: number): void {
    this.wanted = wantedPct;
    if (this.lagS === 0) this.state[at.DRIVE] = wantedPct;
  }

  /** Evaluates where the state stands and in which mode. */
  private look(local: number): void {
    this.path.drivePct = this.state[at.DRIVE]!;
    this.path.settle(this.y, this.k1, local);
    this.region = this.path.region(this.y);
  }

  private ended(local: number): boolean {
    const kind = this.path.endOf(this.y);
    if (kind === null) return false;
    this.end = {kind, atS: this.path.tickS + local, tensionN: this.path.tensionN};
    this.close();
    return true;
  }

  private close(): void {
    const {state, y, path} = this;
    y[at.THETA] = withinTurn(y[at.THETA]!);
    y[at.ROLLER] = withinTurn(y[at.ROLLER]!);
    state[at.TENSION] = path.tensionN;
    state[at.STRAIN] = path.strain;
    if (this.hasCell && !this.hasFilter) y[at.FILTER] = path.signal(path.tensionN);
  }

  /** One step, halved while it crosses a bend. False when the run ended in it. */
  private step(from: number, h: number, depth: number): boolean {
    const {y, k1, path, state, count} = this;
    const {state: y0, slope: s0} = this.before[depth]!;
    const x0 = state[at.DRIVE]!;
    for (let i = 0; i < count; i++) {
      y0[i] = y[i]!;
      s0[i] = k1[i]!;
    }
    this.rungeKutta(from, h);
    const region = path.region(y);
    if (region === this.region) return true;

    if (depth < DEEPEST) {
      for (let i = 0; i < count; i++) {
        y[i] = y0[i]!;
        k1[i] = s0[i]!;
      }
      state[at.DRIVE] = x0;
      return this.step(from, h / 2, depth + 1) && this.step(from + h / 2, h / 2, depth + 1);
    }
    if (this.ended(from + h)) return false;
    path.cross(y);
    this.look(from + h);
    return !this.ended(from + h);
  }

  /** Leaves the new state in `y`, its slope in `k1`. */
  private rungeKutta(from: number, h: number): void {
    const {y, k1, k2, k3, k4, trial, path, state, count} = this;
    const half = h / 2;
    const x0 = state[at.DRIVE]!;
    let middle = x0;
    let end = x0;
    if (this.lagS > 0 && x0 !== this.wanted) {
      if (h !== this.stepS) this.prepare(h);
      middle = this.wanted + (x0 - this.wanted) * this.halfDecay;
      end = this.wanted + (x0 - this.wanted) * this.fullDecay;
    }
    for (let i = 0; i < count; i++) trial[i] = y[i]! + half * k1[i]!;
    path.drivePct = middle;
    path.slopes(trial, k2, from + half);
    for (let i = 0; i < count; i++) trial[i] = y[i]! + half * k2[i]!;
    path.slopes(trial, k3, from + half);
    for (let i = 0; i < count; i++) trial[i] = y[i]! + h * k3[i]!;
    path.drivePct = end;
    path.slopes(trial, k4, from + h);
    const sixth = h / 6;
    for (let i = 0; i < count; i++)
      y[i] = y[i]! + sixth * (k1[i]! + 2 * (k2[i]! + k3[i]!) + k4[i]!);
    state[at.DRIVE] = end;
    path.slopes(y, k1, from + h);
  }

  private prepare(h: number): void {
    this.stepS = h;
    this.halfDecay = decay(h / (2 * this.lagS));
    this.fullDecay = this.halfDecay * this.halfDecay;
  }
}

/** Steps in time: the control tick and the plant steps in it. */
export interface Grid {
  readonly sampleS: number;
  readonly plantStepS: number;
  readonly stepsPerTick: number;
}

function twoStates(): {readonly state: Float64Array; readonly slope: Float64Array} {
  return {state: new Float64Array(at.INTEGRATED), slope: new Float64Array(at.INTEGRATED)};
}
