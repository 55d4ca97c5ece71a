import {type Scenario} from '../scenario/scenario';
import {Points} from '../signal/points';
import {cosine, sine, TWO_PI} from '../signal/sine';
import {fade, fixBrake, grip, STRAIGHT} from './brake';
import * as now from './evaluation';
import {type Line} from './line';
import * as at from './plant-state';
import {fixRoll, inertia, outOfRound, radiusSquare} from './roll';
import {cellSignal, fixSensing} from './sensing';

/**
 * A held roll breaks loose when the web pulls harder than this times what holds it. Without the margin a brake that
 * fades toward the web's pull would be crossed at every rounding of the last digit.
 */
export const LOOSENS = 1 + 1e-9;

/** Nip speed below which the idlers' drag fades [m/s]. */
export const DRAG_FULL_MPS = 0.02;

/**
 * The plant's equations (PHYSICS.md): roll, span, brake heat, sensing, dancer. One call of `slopes` is one
 * evaluation; it leaves tension and the like in `now`. The innermost loop of the project: nothing is
 * allocated, and what a document leaves out costs no more than a comparison.
 */
export class Equations {
  readonly now = new Float64Array(now.EVALUATION_SIZE);
  readonly curve: Points;
  readonly hasDancer: boolean;
  readonly hasFilter: boolean;
  readonly hasRunout: boolean;
  readonly relaxes: boolean;
  private readonly hasFixedPath: boolean;
  private readonly hasGrip: boolean;

  constructor(
    scenario: Scenario,
    private readonly state: Float64Array,
  ) {
    const {now: n} = this;
    const {web, span, brake, sensing} = scenario;
    n[now.AREA] = web.widthM * web.thicknessM;
    n[now.LOSS_S] = web.lossTimeS ?? 0;
    n[now.BREAK_N] = web.breakNPerM * web.widthM;
    n[now.SPAN_M] = span.lengthM;
    n[now.PER_SPAN] = 1 / span.lengthM;
    n[now.IDLER_N] = span.idlerDragN ?? 0;
    n[now.IDLER_KG] = span.idlerMassKg ?? 0;
    n[now.RUNOUT] = span.rollerRunoutM ?? 0;
    n[now.PER_ROLLER] = 1 / (span.rollerRadiusM ?? 0.05);
    fixRoll(n, scenario);
    fixBrake(n, brake);
    fixSensing(n, scenario);
    this.curve = new Points(brake.curve ?? STRAIGHT);
    this.hasDancer = sensing.kind === 'dancer';
    this.hasFilter = n[now.PER_FILTER]! > 0;
    n[now.MAXWELL_N] = (web.maxwellModulusPa ?? 0) * n[now.AREA];
    n[now.PER_MAXWELL] = 1 / (web.maxwellTimeS ?? 100);
    this.relaxes = n[now.MAXWELL_N] > 0;
    this.hasRunout = n[now.RUNOUT] > 0;
    this.hasFixedPath = !this.hasDancer && !this.hasRunout;
    this.hasGrip = n[now.EXTRA_GRIP]! > 0;
  }

  /** Renews what follows from the state: after a disturbance and after a load. */
  refresh(): void {
    const {state, now: n} = this;
    const stiffnessN = state[at.MODULUS]! * n[now.AREA]!;
    n[now.STIFFNESS] = stiffnessN;
    n[now.PER_WOUND] = 1 / (1 + n[now.WOUND_N]! / stiffnessN);
    n[now.OUT_OF_ROUND] = state[at.ECCENTRICITY] === 0 && state[at.OVAL] === 0 ? 0 : 1;
  }

  /** Takes one piece of the line's speed. */
  setPiece(line: Line, piece: number): void {
    const {now: n} = this;
    const half = (line.ends[piece]! - line.starts[piece]!) / 2;
    n[now.PIECE_START] = line.starts[piece]!;
    n[now.C0] = line.c0[piece]!;
    n[now.C1] = line.c1[piece]!;
    n[now.C2] = line.c2[piece]!;
    n[now.MOVES] = n[now.C0] + half * (n[now.C1] + half * n[now.C2]) > 0 ? 1 : 0;
  }

  /** Signal of the load cell [N] for this web tension, or for the known load that hangs instead. */
  signal(tensionN: number): number {
    const {state} = this;
    const force = state[at.LOADED] === 1 ? state[at.LOAD]! : tensionN;
    return cellSignal(state[at.ZERO]!, state[at.SPAN_PCT]!, force);
  }

  /** Finds the mode of a state: held or sliding, dancer free or at a stop. Leaves an evaluation behind. */
  settle(y: Float64Array, slope: Float64Array): void {
    const {now: n} = this;
    if (this.hasDancer) this.settleDancer(y);
    const omega = y[at.OMEGA]!;
    n[now.SLIDING] = omega > 0 ? 1 : omega < 0 ? -1 : 0;
    this.slopes(y, slope);
    if (n[now.STOP] !== 0 && n[now.DANCER_PULL]! * n[now.STOP]! < 0) {
      n[now.STOP] = 0;
      this.slopes(y, slope);
    }
    if (omega === 0 && Math.abs(n[now.PULL]!) > n[now.DRAG]! * LOOSENS) {
      n[now.SLIDING] = n[now.PULL]! > 0 ? 1 : -1;
      this.slopes(y, slope);
    }
  }

  /** Slopes of the integrated states at the time in CLOCK. */
  slopes(y: Float64Array, slope: Float64Array): void {
    const {state, now: n, curve} = this;
    const omega = y[at.OMEGA]!;
    const length = y[at.LENGTH]!;
    const heat = y[at.HEAT]!;

    const since = n[now.CLOCK]! - n[now.PIECE_START]!;
    let v = n[now.C0]! + since * (n[now.C1]! + since * n[now.C2]!);
    if (n[now.MOVES] === 1 && state[at.RIPPLE] !== 0) v += this.ripple();

    const square = radiusSquare(n, y[at.WOUND]!);
    let radius = Math.sqrt(square);
    if (n[now.OUT_OF_ROUND] === 1)
      radius += outOfRound(state[at.ECCENTRICITY]!, state[at.OVAL]!, cosine(y[at.THETA]!));

    let path = n[now.SPAN_M]!;
    let pathSlope = 0;
    if (this.hasDancer) {
      path += 2 * y[at.DANCER]!;
      if (n[now.STOP] === 0) pathSlope = 2 * y[at.DANCER_SPEED]!;
    }
    if (this.hasRunout) {
      const angle = y[at.ROLLER]!;
      const turning = v * n[now.PER_ROLLER]!;
      path += n[now.RUNOUT]! * cosine(angle);
      pathSlope -= n[now.RUNOUT]! * sine(angle) * turning;
      slope[at.ROLLER] = turning;
    }

    const perLength = 1 / length;
    const stretch = path * perLength; // 1 + strain
    const paidOut = omega * radius * n[now.PER_WOUND]!; // relaxed length off the roll [m/s]
    let lengthSlope = paidOut - v;
    let raw = 0;
    let tension = 0;
    let rollN = 0;
    if (stretch > 1) {
      lengthSlope = paidOut - v * length * (this.hasFixedPath ? n[now.PER_SPAN]! : 1 / path);
      const strainSlope = (pathSlope - stretch * lengthSlope) * perLength;
      raw = n[now.STIFFNESS]! * (stretch - 1 + n[now.LOSS_S]! * strainSlope);
      if (this.relaxes) raw += n[now.MAXWELL_N]! * (stretch - 1 - y[at.RELAXED]!);
      if (raw > 0) tension = raw;
      rollN = tension - n[now.IDLER_KG]! * (n[now.C1]! + 2 * since * n[now.C2]!);
      if (v >= DRAG_FULL_MPS) rollN -= n[now.IDLER_N]!;
      else if (v > 0) rollN -= (n[now.IDLER_N]! * v) / DRAG_FULL_MPS;
    }
    const pull = rollN > 0 ? rollN * radius : 0;

    const drive = n[now.DRIVE_PCT]!;
    const piece = curve.piece(drive);
    let torque = n[now.RESIDUAL]! + n[now.TORQUE_SPAN]! * curve.on(piece, drive);
    if (heat > n[now.FADE_START]!) {
      const share = fade(n, heat);
      torque *= share;
      n[now.FADE] = share;
    } else n[now.FADE] = 1;
    if (this.hasGrip) torque *= grip(n, omega);
    const drag = torque + n[now.COULOMB]!;

    const sliding = n[now.SLIDING]!;
    slope[at.OMEGA] =
      sliding === 0 ? 0 : (pull - n[now.VISCOUS]! * omega - drag * sliding) / inertia(n, square);
    slope[at.THETA] = omega;
    slope[at.WOUND] = -paidOut;
    slope[at.LENGTH] = lengthSlope;
    slope[at.HEAT] =
      n[now.PER_CAPACITY]! *
      (torque * Math.abs(omega) - n[now.CONDUCTANCE]! * (heat - n[now.AMBIENT]!));
    if (this.relaxes)
      slope[at.RELAXED] = this.relaxing(y[at.RELAXED]!, stretch, paidOut * perLength);
    if (this.hasFilter)
      slope[at.FILTER] = n[now.PER_FILTER]! * (this.signal(tension) - y[at.FILTER]!);
    else if (this.hasDancer) this.dancerSlopes(y, slope, tension);

    n[now.TENSION_NOW] = tension;
    n[now.STRAIN_NOW] = stretch - 1;
    n[now.PULL] = pull;
    n[now.DRAG] = drag;
    n[now.SPEED] = v;
    n[now.RAW] = raw;
    n[now.ROLL_TENSION] = rollN;
    n[now.CURVE_PIECE] = piece;
  }

  private dancerSlopes(y: Float64Array, slope: Float64Array, tension: number): void {
    const {now: n} = this;
    const force = 2 * n[now.LOADING]! - 2 * tension;
    const speed = y[at.DANCER_SPEED]!;
    const isFree = n[now.STOP] === 0;
    slope[at.DANCER] = isFree ? speed : 0;
    slope[at.DANCER_SPEED] = isFree ? n[now.PER_MASS]! * (force - n[now.DAMPING]! * speed) : 0;
    n[now.DANCER_PULL] = force;
  }

  /**
   * Slope of the dashpot's strain: toward the web's in the branch's own time, and toward the strain in the roll's
   * outer lap as web of that strain comes in, `perS` spans a second.
   */
  private relaxing(strain: number, stretch: number, perS: number): number {
    const {now: n} = this;
    const ofWeb = stretch > 1 ? stretch - 1 : 0;
    return n[now.PER_MAXWELL]! * (ofWeb - strain) - perS * (strain - (1 / n[now.PER_WOUND]! - 1));
  }

  private settleDancer(y: Float64Array): void {
    const {now: n} = this;
    const p = y[at.DANCER]!;
    const q = y[at.DANCER_SPEED]!;
    const stop = p <= 0 && q <= 0 ? -1 : p >= n[now.TRAVEL]! && q >= 0 ? 1 : 0;
    if (stop !== 0) y[at.DANCER_SPEED] = 0;
    n[now.STOP] = stop;
  }

  private ripple(): number {
    const {state, now: n} = this;
    const turns = state[at.RIPPLE_HZ]! * (n[now.TICK_S]! + n[now.CLOCK]!);
    return state[at.RIPPLE]! * sine(TWO_PI * (turns - Math.floor(turns)));
  }
}
