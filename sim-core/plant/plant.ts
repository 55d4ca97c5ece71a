import {type Disturbance, type Scenario} from '../scenario/scenario';
import {decay} from '../signal/decay';
import {fade, grip, lagsOf} from './brake';
import {Drive} from './drive';
import {Equations} from './equations';
import * as now from './evaluation';
import {Line} from './line';
import * as at from './plant-state';
import {endOf, isJustLoose, JUMPS, regionOf, rest} from './regions';
import {type Grid, Stand, withinTurn} from './stand';

/**
 * How often a step is halved that crosses a bend; the last halves count as "at the bend". A kink leaves an
 * error of the second order in the last half; a jump (stick, slack, stop) one of the first.
 */
const DEEPEST_KINK = 6;
const DEEPEST = 16;

/**
 * Steps of a tick after which no bend is looked at closer: a web that is just loose on a line that just creeps
 * bends in every step, and a tick must end.
 */
const MOST_IN_TICK = 4000;

/** Times closer than this are the same moment [s]. */
const SAME_S = 1e-12;

/** How the plant's run came to an end. */
export interface PlantEnd {
  readonly kind: 'webBroke' | 'rollEmpty';
  readonly atS: number;
  readonly tensionN: number;
}

/** Places in the times of the integration, in a typed array as they change with every step. */
const FROM = 0; // start of the step within the tick [s]
const STEP = 1; // its length [s]
const WANTED = 2; // delayed command of the drive [%]
const PREPARED = 3; // step for which the two factors below hold [s]
const HALF_DECAY = 4;
const FULL_DECAY = 5;
const LAG = 6; // of the drive toward the present command [s]

/**
 * The plant over one control tick: fourth-order Runge–Kutta steps, cut where the
 * line's speed bends and halved where the equations bend (stick, slack, stops, knees of the curve). The
 * drive's lag is followed exactly. Speed beats form here; the state is the caller's typed array.
 */
export class Plant {
  readonly line: Line;
  readonly stand: Stand;
  readonly equations: Equations;
  readonly drive: Drive;
  /** How the run ended, once it has. */
  end: PlantEnd | null = null;

  private readonly y: Float64Array;
  private readonly hasCell: boolean;
  private readonly hasFilter: boolean;
  private readonly canRest: boolean;
  /** Share that a tick at rest leaves of the brake's excess temperature, and of what the filter still lacks. */
  private readonly coolsTo: number;
  private readonly filterKeeps: number;
  private readonly lagUpS: number;
  private readonly lagDownS: number;
  private readonly times = new Float64Array(7);
  private readonly k1 = new Float64Array(at.INTEGRATED);
  private readonly k2 = new Float64Array(at.INTEGRATED);
  private readonly k3 = new Float64Array(at.INTEGRATED);
  private readonly k4 = new Float64Array(at.INTEGRATED);
  private readonly trial = new Float64Array(at.INTEGRATED);
  /** State and slope at the start of a step, one pair for each depth of halving. */
  private readonly before = Array.from({length: DEEPEST + 1}, twoStates);
  /** States looked after: all of them only with a dancer, a roller with run-out or a relaxing web. */
  readonly count: number;
  private region = 0;
  private spent = 0;
  private piece = 0;

  static size(scenario: Scenario, grid: Grid): number {
    const drive = Drive.size(scenario.brake.deadTimeS ?? 0, grid.plantStepS, grid.stepsPerTick);
    return at.PLANT_SIZE + drive + Line.size(scenario.lineRoundS ?? 0, grid.sampleS);
  }

  constructor(
    private readonly scenario: Scenario,
    private readonly state: Float64Array,
    private readonly grid: Grid,
  ) {
    const {brake, sensing} = scenario;
    const {plantStepS, stepsPerTick} = grid;
    const deadTimeS = brake.deadTimeS ?? 0;
    const driveEnd = at.PLANT_SIZE + Drive.size(deadTimeS, plantStepS, stepsPerTick);
    const driveState = state.subarray(at.PLANT_SIZE, driveEnd);
    this.line = new Line(state.subarray(driveEnd));
    this.equations = new Equations(scenario, state);
    this.stand = new Stand(scenario, state, this.equations, grid);
    this.drive = new Drive(driveState, brake, plantStepS, stepsPerTick);
    this.y = state.subarray(0, at.INTEGRATED);
    [this.lagUpS, this.lagDownS] = lagsOf(brake);
    this.hasCell = sensing.kind === 'loadCell';
    this.hasFilter = this.equations.hasFilter;
    this.canRest = this.hasCell && !this.equations.hasRunout && !this.equations.relaxes;
    this.coolsTo = decay((grid.sampleS * brake.conductanceWPerK) / brake.capacityJPerK);
    const filterS = sensing.kind === 'loadCell' ? sensing.filterS : 0;
    this.filterKeeps = filterS > 0 ? decay(grid.sampleS / filterS) : 0;
    const isShort = this.hasCell && !this.equations.hasRunout && !this.equations.relaxes;
    this.count = isShort ? at.DANCER : at.INTEGRATED;
  }

  /** State at t = 0. */
  reset(standstillPct: number): void {
    const {brake, lineRoundS} = this.scenario;
    this.stand.reset();
    this.line.reset(lineRoundS ?? 0);
    this.drive.reset(standstillPct, brake);
    this.state[at.DRIVE] = standstillPct;
  }

  disturb(values: Disturbance, lineStands: boolean): void {
    if (values.supply !== undefined) this.drive.supply = values.supply;
    this.stand.disturb(values, lineStands);
  }

  /** Begins a tick, its commands and disturbances done: lays out the line's speed. */
  openTick(t: number): void {
    const {equations, y} = this;
    this.line.openTick(t, this.grid.sampleS);
    equations.now[now.TICK_S] = t;
    this.piece = 0;
    equations.setPiece(this.line, 0);
    if (this.hasFilter || !this.hasCell) return;
    // no filter: the sample is the signal of this very moment
    equations.now[now.CLOCK] = 0;
    equations.slopes(y, this.k1);
    y[at.FILTER] = equations.signal(equations.now[now.TENSION_NOW]!);
  }

  /** Moves the plant through the tick with this output and, for a dancer, this loading. */
  move(tick: number, outputPct: number, loadingN: number): void {
    const {equations, grid, drive, times} = this;
    drive.command(tick, outputPct);
    equations.now[now.LOADING] = loadingN;
    const early = drive.early(tick);
    const late = drive.late(tick);
    // the delayed command may change inside the tick
    let changesAtS = early === late ? 0 : drive.changesAtStep * grid.plantStepS;
    this.setCommand(changesAtS > 0 ? early : late);
    times[FROM] = 0;
    this.spent = 0;
    this.look();
    if (this.ended()) return;
    if (this.rest(changesAtS, late)) return;

    const steps = this.stand.stepsInTick();
    for (let step = 1; step <= steps; step++) {
      const to = (step * grid.sampleS) / steps;
      if (changesAtS > 0 && changesAtS < to + SAME_S) {
        if (!this.moveTo(changesAtS)) return;
        this.setCommand(late);
        this.look();
        changesAtS = 0;
      }
      if (to > times[FROM] + SAME_S && !this.moveTo(to)) return;
    }
    this.close();
  }

  /**
   * A tick of a roll held under a standing line, in closed form: tension and lengths stay, drive, heat and filter
   * each follow their own exponential. False when the brake might let go or its curve bends: then nothing is done.
   */
  private rest(changesAtS: number, late: number): boolean {
    const {equations, y, state, times, grid} = this;
    const {now: n, curve} = equations;
    if (!this.canRest || n[now.SLIDING] !== 0 || !this.line.isAtRest()) return false;
    const from = state[at.DRIVE]!;
    const early = changesAtS > 0 ? this.approach(from, times[WANTED]!, changesAtS) : from;
    const to = this.approach(early, late, grid.sampleS - changesAtS);
    const piece = curve.piece(from);
    if (curve.piece(early) !== piece || curve.piece(to) !== piece) return false;

    const cooled = n[now.AMBIENT]! + (y[at.HEAT]! - n[now.AMBIENT]!) * this.coolsTo;
    const least = Math.min(curve.on(piece, from), curve.on(piece, early), curve.on(piece, to));
    const torque = n[now.RESIDUAL]! + n[now.TORQUE_SPAN]! * least;
    const kept = Math.min(fade(n, y[at.HEAT]!), fade(n, cooled));
    const holds = torque * kept * grip(n, 0) + n[now.COULOMB]!;
    if (!(Math.abs(n[now.PULL]!) <= holds)) return false;

    const signal = equations.signal(n[now.TENSION_NOW]!);
    y[at.FILTER] = signal + (y[at.FILTER]! - signal) * this.filterKeeps;
    y[at.HEAT] = cooled;
    y[at.DRIVE] = to;
    this.close();
    return true;
  }

  /** Where the drive [%] is after `forS` [s] of one command. */
  private approach(from: number, wanted: number, forS: number): number {
    if (from === wanted) return from;
    const lagS = wanted > from ? this.lagUpS : this.lagDownS;
    return lagS > 0 ? wanted + (from - wanted) * decay(forS / lagS) : wanted;
  }

  /** Moves on to a time within the tick, cutting where the line's speed bends. False when the run ended. */
  private moveTo(to: number): boolean {
    const {line, times} = this;
    while (this.piece + 1 < line.pieces && line.ends[this.piece]! < to - SAME_S) {
      const bend = line.ends[this.piece]!;
      if (bend > times[FROM]! + SAME_S) {
        times[STEP] = bend - times[FROM]!;
        if (!this.step(0)) return false;
        times[FROM] = bend;
      }
      this.piece++;
      this.equations.setPiece(line, this.piece);
      this.look();
    }
    times[STEP] = to - times[FROM]!;
    if (!this.step(0)) return false;
    times[FROM] = to;
    return true;
  }

  private setCommand(wantedPct: number): void {
    const {times, state} = this;
    const lagS = wantedPct > state[at.DRIVE]! ? this.lagUpS : this.lagDownS;
    times[WANTED] = wantedPct;
    if (lagS !== times[LAG]!) times[PREPARED] = 0;
    times[LAG] = lagS;
    if (lagS === 0) state[at.DRIVE] = wantedPct;
  }

  /** Evaluates where the state stands and in which mode. */
  private look(): void {
    const {equations, y} = this;
    equations.now[now.CLOCK] = this.times[FROM]!;
    equations.now[now.DRIVE_PCT] = this.state[at.DRIVE]!;
    equations.settle(y, this.k1);
    this.region = regionOf(equations, y);
  }

  private ended(): boolean {
    const {equations, times} = this;
    const kind = endOf(equations, this.y);
    if (kind === null) return false;
    const atS = equations.now[now.TICK_S]! + times[FROM]!;
    this.end = {kind, atS, tensionN: equations.now[now.TENSION_NOW]!};
    this.close();
    return true;
  }

  private close(): void {
    const {state, y, equations} = this;
    y[at.THETA] = withinTurn(y[at.THETA]!);
    y[at.ROLLER] = withinTurn(y[at.ROLLER]!);
    state[at.TENSION] = equations.now[now.TENSION_NOW]!;
    state[at.STRAIN] = equations.now[now.STRAIN_NOW]!;
    if (this.hasCell && !this.hasFilter) y[at.FILTER] = equations.signal(state[at.TENSION]);
  }

  /** One step of STEP from FROM, halved while it crosses a bend. False when the run ended in it. */
  private step(depth: number): boolean {
    const {y, k1, count} = this;
    const {state: y0, slope: s0} = this.before[depth]!;
    for (let i = 0; i < count; i++) {
      y0[i] = y[i]!;
      s0[i] = k1[i]!;
    }
    this.rungeKutta();
    this.spent++;
    const bends = regionOf(this.equations, y) ^ this.region;
    if (bends === 0) return true;
    if (isJustLoose(this.equations, bends)) return this.cross();
    const deepest = (bends & JUMPS) === 0 ? DEEPEST_KINK : DEEPEST;
    const isWorthIt = depth < deepest && this.spent < MOST_IN_TICK;
    return isWorthIt ? this.halve(depth) : this.cross();
  }

  /** Takes a step back and does it again in two halves. */
  private halve(depth: number): boolean {
    const {y, k1, count, times} = this;
    const {state: y0, slope: s0} = this.before[depth]!;
    for (let i = 0; i < count; i++) {
      y[i] = y0[i]!;
      k1[i] = s0[i]!;
    }
    const from = times[FROM]!;
    const half = times[STEP]! / 2;
    for (let part = 0; part < 2; part++) {
      times[FROM] = from + part * half;
      times[STEP] = half;
      if (!this.step(depth + 1)) return false;
    }
    return true;
  }

  /** At a bend, near enough: the state rests where it must, and its mode is found anew. */
  private cross(): boolean {
    const {times} = this;
    times[FROM] = times[FROM]! + times[STEP]!;
    if (this.ended()) return false;
    rest(this.equations, this.y);
    this.look();
    return !this.ended();
  }

  /** Leaves the new state in `y`, its slope in `k1`. */
  private rungeKutta(): void {
    const {y, k1, k2, k3, k4, trial, equations, state, count, times} = this;
    const {now: n} = equations;
    const from = times[FROM]!;
    const h = times[STEP]!;
    const half = h / 2;
    const x0 = state[at.DRIVE]!;
    let middle = x0;
    let end = x0;
    const gap = x0 - times[WANTED]!;
    if (gap !== 0 && times[LAG]! > 0) {
      if (h !== times[PREPARED]) this.prepare();
      middle = times[WANTED]! + gap * times[HALF_DECAY]!;
      end = times[WANTED]! + gap * times[FULL_DECAY]!;
    }
    n[now.CLOCK] = from + half;
    n[now.DRIVE_PCT] = middle;
    for (let i = 0; i < count; i++) trial[i] = y[i]! + half * k1[i]!;
    equations.slopes(trial, k2);
    for (let i = 0; i < count; i++) trial[i] = y[i]! + half * k2[i]!;
    equations.slopes(trial, k3);
    n[now.CLOCK] = from + h;
    n[now.DRIVE_PCT] = end;
    for (let i = 0; i < count; i++) trial[i] = y[i]! + h * k3[i]!;
    equations.slopes(trial, k4);
    const sixth = h / 6;
    for (let i = 0; i < count; i++) y[i]! += sixth * (k1[i]! + 2 * (k2[i]! + k3[i]!) + k4[i]!);
    state[at.DRIVE] = end;
    equations.slopes(y, k1);
  }

  private prepare(): void {
    const {times} = this;
    const half = decay(times[STEP]! / (2 * times[LAG]!));
    times[PREPARED] = times[STEP]!;
    times[HALF_DECAY] = half;
    times[FULL_DECAY] = half * half;
  }
}

function twoStates(): {readonly state: Float64Array; readonly slope: Float64Array} {
  return {state: new Float64Array(at.INTEGRATED), slope: new Float64Array(at.INTEGRATED)};
}
