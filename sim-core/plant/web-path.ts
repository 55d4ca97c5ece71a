import {type Disturbance, type LoadCellParams, type Scenario} from '../scenario/scenario';
import {cosine, sine, TWO_PI} from '../signal/sine';
import {type Brake, brakeOf, fade, grip} from './brake';
import {type Line} from './line';
import * as at from './plant-state';
import {inertia, meanRadius, outOfRound, type RollShape, rollShape, woundLength} from './roll';
import {cellSignal} from './sensing';
import {fastestRate, stepParts} from './stiffness';

/** Nip speed below which the idlers' drag fades [m/s]. */
const DRAG_FULL_MPS = 0.02;

/** Where a state lies among the places at which the equations bend, one bit each. */
const TAUT = 1;
const PULLING = 2;
const ROLL_PULLED = 4;
const TURNED_BACK = 8; // sliding, and the speed has changed its sign
const BROKEN_LOOSE = 16; // held, and the web pulls harder than the brake holds
const FADING = 32;
const FADED = 64;
const CREEPING = 128;
const FORWARD = 256;
const PAST_STOP = 512; // beyond a stop, or at one and drawn inward
const WEB_BROKEN = 1024;
const ROLL_EMPTY = 2048;
const CURVE_PIECE = 4096; // the piece of the brake's curve, counted in the bits above

/** Bits that need more than a fine step: a state changes with them. */
export const JUMPS = TURNED_BACK | BROKEN_LOOSE | PAST_STOP | WEB_BROKEN | ROLL_EMPTY;

/**
 * The plant's equations (PHYSICS.md): roll, span, sensing, brake heat, dancer. One call of `slopes` is one
 * evaluation of them; it leaves tension and the like in public fields for the caller to look at. This is
 * the innermost loop of the project: numbers live in fields and typed arrays, nothing is allocated.
 */
export class WebPath {
  // What the caller sets before an evaluation
  /** Brake drive at the time of the evaluation [%]. */
  drivePct = 0;
  /** Loading tension of the dancer [N]. */
  loadingN = 0;
  /** 0: the brake holds the roll at rest; otherwise the direction it slides in. */
  sliding = 0;
  /** 0: dancer free; −1, 1: at the lower, upper stop. */
  stop = 0;
  /** Start of the tick [s]; time within it is given with each evaluation. */
  tickS = 0;
  /** Piece of the line's speed in force. */
  piece = 0;

  // What an evaluation leaves
  tensionN = 0;
  strain = 0;
  /** Pull of the web on the roll [N·m]. */
  pullNm = 0;
  /** Most that the brake and the bearings hold or drag [N·m]. */
  dragNm = 0;
  /** Pull of tension and loading on the dancer [N]; more moves it up. */
  dancerN = 0;
  private speedMps = 0;
  private rawN = 0;
  private rollN = 0;
  private curvePiece = 0;

  /** Parts that a plant step is divided into at the present stiffness. */
  parts = 1;

  readonly shape: RollShape;
  readonly brake: Brake;
  private readonly hasDancer: boolean;
  private readonly lossS: number;
  private readonly coulombNm: number;
  private readonly viscousNmS: number;
  private readonly spanM: number;
  private readonly idlerN: number;
  private readonly idlerKg: number;
  private readonly runoutM: number;
  private readonly perRoller: number;
  private readonly perFilter: number;
  private readonly perMass: number;
  private readonly damping: number;
  private readonly breakN: number;
  private readonly travelM: number;
  private readonly areaM2: number;

  // Follow from the state; renewed by `refresh`
  private stiffnessN = 0;
  private perWound = 1;
  private isRound = true;

  constructor(
    private readonly scenario: Scenario,
    private readonly state: Float64Array,
    private readonly line: Line,
    private readonly plantStepS: number,
  ) {
    const {web, roll, span, sensing} = scenario;
    this.shape = rollShape(scenario);
    this.brake = brakeOf(scenario.brake);
    this.areaM2 = web.widthM * web.thicknessM;
    this.lossS = web.lossTimeS ?? 0;
    this.breakN = web.breakNPerM * web.widthM;
    this.coulombNm = roll.coulombNm ?? 0;
    this.viscousNmS = roll.viscousNmS ?? 0;
    this.spanM = span.lengthM;
    this.idlerN = span.idlerDragN ?? 0;
    this.idlerKg = span.idlerMassKg ?? 0;
    this.runoutM = span.rollerRunoutM ?? 0;
    this.perRoller = 1 / (span.rollerRadiusM ?? 0.05);
    this.hasDancer = sensing.kind === 'dancer';
    this.perFilter = sensing.kind === 'loadCell' && sensing.filterS > 0 ? 1 / sensing.filterS : 0;
    this.perMass = sensing.kind === 'dancer' ? 1 / sensing.massKg : 0;
    this.damping = sensing.kind === 'dancer' ? sensing.dampingNsPerM : 0;
    this.travelM = sensing.kind === 'dancer' ? sensing.travelM : 0;
  }

  /** State at t = 0: everything at rest, the web at its initial tension. */
  reset(): void {
    const {state, scenario} = this;
    const {web, roll, sensing, initialTensionN} = scenario;
    const cell: Partial<LoadCellParams> = sensing.kind === 'loadCell' ? sensing : {};
    state.fill(0);
    state[at.MODULUS] = web.modulusPa;
    state[at.ECCENTRICITY] = roll.eccentricityM ?? 0;
    state[at.OVAL] = roll.ovalM ?? 0;
    state[at.ZERO] = cell.zeroN ?? 0;
    state[at.SPAN_PCT] = cell.spanPct ?? 100;
    state[at.WOUND] = woundLength(this.shape, roll.radiusM);
    state[at.LARGEST] = roll.radiusM;
    state[at.HEAT] = this.brake.ambientC;
    state[at.DANCER] = this.travelM / 2;
    this.refresh();
    this.layAt(initialTensionN);
    state[at.TENSION] = initialTensionN;
    state[at.STRAIN] = initialTensionN / this.stiffnessN;
    if (!this.hasDancer) state[at.FILTER] = this.signal(initialTensionN);
  }

  /** Renews what follows from the state: after a disturbance and after a load. */
  refresh(): void {
    const {state} = this;
    this.stiffnessN = state[at.MODULUS]! * this.areaM2;
    this.perWound = 1 / (1 + this.scenario.roll.woundTensionN / this.stiffnessN);
    this.isRound = state[at.ECCENTRICITY] === 0 && state[at.OVAL] === 0;
    const rate = fastestRate(this.scenario, state[at.MODULUS]!, state[at.LARGEST]!);
    this.parts = stepParts(this.plantStepS, rate);
  }

  /** All values of one disturbance act together. */
  disturb(values: Disturbance, lineStands: boolean): void {
    const {state} = this;
    const surface = state[at.OMEGA]! * this.effectiveRadius();
    const put = (place: number, value: number | undefined): void => {
      if (value !== undefined) state[place] = value;
    };
    put(at.MODULUS, values.modulusPa);
    put(at.ECCENTRICITY, values.eccentricityM);
    put(at.OVAL, values.ovalM);
    put(at.ZERO, values.zeroN);
    put(at.SPAN_PCT, values.spanPct);
    put(at.RIPPLE, values.rippleMps);
    put(at.RIPPLE_HZ, values.rippleHz);
    if (values.knownLoadN !== undefined) {
      state[at.LOAD] = values.knownLoadN ?? 0;
      state[at.LOADED] = values.knownLoadN === null ? 0 : 1;
    }
    if (values.radiusM !== undefined)
      state[at.LARGEST] = Math.max(state[at.LARGEST]!, values.radiusM);
    this.refresh();
    if (values.radiusM !== undefined) this.changeRoll(values.radiusM, surface, lineStands);
  }

  /** Mean radius of the roll [m]. */
  radius(): number {
    return meanRadius(this.shape, this.state[at.WOUND]!);
  }

  /** Web above the straight path [m]. */
  slack(): number {
    return Math.max(0, this.state[at.LENGTH]! - this.pathLength());
  }

  /** Torque of the brake at the present state [N·m]; at rest the most it can hold. */
  torque(): number {
    const {state, brake} = this;
    const share = brake.curve.at(state[at.DRIVE]!);
    const cold = brake.residualNm + brake.spanNm * share;
    return cold * fade(brake, state[at.HEAT]!) * grip(brake, state[at.OMEGA]!);
  }

  /** Signal of the load cell [N] for this web tension, or for the known load that hangs instead. */
  signal(tensionN: number): number {
    const {state} = this;
    const force = state[at.LOADED] === 1 ? state[at.LOAD]! : tensionN;
    return cellSignal(state[at.ZERO]!, state[at.SPAN_PCT]!, force);
  }

  /** Which mode the state is in: held or sliding, dancer free or at a stop. Leaves an evaluation behind. */
  settle(y: Float64Array, slope: Float64Array, local: number): void {
    if (this.hasDancer) this.settleDancer(y);
    const omega = y[at.OMEGA]!;
    this.sliding = Math.sign(omega);
    this.slopes(y, slope, local);
    if (this.hasDancer && this.stop !== 0 && this.dancerN * this.stop < 0) {
      this.stop = 0;
      this.slopes(y, slope, local);
    }
    if (omega === 0 && Math.abs(this.pullNm) > this.dragNm) {
      this.sliding = Math.sign(this.pullNm);
      this.slopes(y, slope, local);
    }
  }

  /** After a step that ended past a bend: what the state does there. */
  cross(y: Float64Array): void {
    if (this.sliding !== 0 && y[at.OMEGA]! * this.sliding < 0) y[at.OMEGA] = 0;
    if (!this.hasDancer) return;
    if (y[at.DANCER]! < 0) {
      y[at.DANCER] = 0;
      y[at.DANCER_SPEED] = 0;
    } else if (y[at.DANCER]! > this.travelM) {
      y[at.DANCER] = this.travelM;
      y[at.DANCER_SPEED] = 0;
    }
  }

  /** Slopes of the integrated states at `local` seconds into the tick. */
  slopes(y: Float64Array, slope: Float64Array, local: number): void {
    const {state, line, piece, brake, shape} = this;
    const omega = y[at.OMEGA]!;
    const length = y[at.LENGTH]!;
    const heat = y[at.HEAT]!;

    const since = local - line.starts[piece]!;
    const c1 = line.c1[piece]!;
    const c2 = line.c2[piece]!;
    let v = line.c0[piece]! + since * (c1 + since * c2);
    const acceleration = c1 + 2 * since * c2;
    const ripple = state[at.RIPPLE]!;
    if (ripple !== 0 && this.lineMoves()) v += ripple * this.rippleWave(local);

    const square = shape.coreSquare + shape.perLength * y[at.WOUND]!;
    let radius = Math.sqrt(square);
    if (!this.isRound)
      radius += outOfRound(state[at.ECCENTRICITY]!, state[at.OVAL]!, cosine(y[at.THETA]!));
    const v1 = omega * radius;

    let path = this.spanM;
    let pathSlope = 0;
    if (this.hasDancer) {
      path += 2 * y[at.DANCER]!;
      if (this.stop === 0) pathSlope = 2 * y[at.DANCER_SPEED]!;
    }
    if (this.runoutM !== 0) {
      path += this.runoutM * cosine(y[at.ROLLER]!);
      pathSlope -= this.runoutM * sine(y[at.ROLLER]!) * v * this.perRoller;
      slope[at.ROLLER] = v * this.perRoller;
    }

    const stretch = path / length; // 1 + strain
    const strain = stretch - 1;
    const paidOut = v1 * this.perWound;
    const lengthSlope = paidOut - (strain > 0 ? v / stretch : v);
    let raw = 0;
    let tension = 0;
    let rollN = 0;
    if (strain > 0) {
      const strainSlope = (pathSlope - stretch * lengthSlope) / length;
      raw = this.stiffnessN * (strain + this.lossS * strainSlope);
      if (raw > 0) tension = raw;
      let lost = this.idlerKg * acceleration;
      if (v > 0) lost += v < DRAG_FULL_MPS ? (this.idlerN * v) / DRAG_FULL_MPS : this.idlerN;
      rollN = tension - lost;
    }
    const pull = rollN > 0 ? rollN * radius : 0;

    const drive = this.drivePct;
    const curvePiece = brake.curve.piece(drive);
    const cold = brake.residualNm + brake.spanNm * brake.curve.on(curvePiece, drive);
    const torque = cold * fade(brake, heat) * (brake.extraGrip === 0 ? 1 : grip(brake, omega));
    const drag = torque + this.coulombNm;

    slope[at.OMEGA] =
      this.sliding === 0
        ? 0
        : (pull - this.viscousNmS * omega - drag * this.sliding) / inertia(shape, square);
    slope[at.THETA] = omega;
    slope[at.WOUND] = -paidOut;
    slope[at.LENGTH] = lengthSlope;
    slope[at.HEAT] =
      brake.perCapacity *
      (torque * Math.abs(omega) - brake.conductanceWPerK * (heat - brake.ambientC));
    if (this.perFilter !== 0)
      slope[at.FILTER] = this.perFilter * (this.signal(tension) - y[at.FILTER]!);
    if (this.hasDancer) {
      const force = 2 * this.loadingN - 2 * tension;
      this.dancerN = force;
      const isFree = this.stop === 0;
      const speed = y[at.DANCER_SPEED]!;
      slope[at.DANCER] = isFree ? speed : 0;
      slope[at.DANCER_SPEED] = isFree ? this.perMass * (force - this.damping * speed) : 0;
    }

    this.tensionN = tension;
    this.strain = strain;
    this.pullNm = pull;
    this.dragNm = drag;
    this.speedMps = v;
    this.rawN = raw;
    this.rollN = rollN;
    this.curvePiece = curvePiece;
  }

  /** Bits of where the last evaluation lies; two that differ have a bend between them. */
  region(y: Float64Array): number {
    let bits = (this.curvePiece + 1) * CURVE_PIECE;
    const {brake} = this;
    const omega = y[at.OMEGA]!;
    if (this.strain > 0) bits |= TAUT;
    if (this.rawN > 0) bits |= PULLING;
    if (this.rollN > 0) bits |= ROLL_PULLED;
    if (this.sliding === 0) {
      if (Math.abs(this.pullNm) > this.dragNm) bits |= BROKEN_LOOSE;
    } else if (omega * this.sliding < 0) bits |= TURNED_BACK;
    if (brake.fadePerK > 0 && y[at.HEAT]! > brake.fadeStartC) {
      bits |= FADING;
      if (fade(brake, y[at.HEAT]!) === 0.3) bits |= FADED;
    }
    if (this.speedMps > 0) bits |= FORWARD;
    if (this.idlerN > 0 && this.speedMps < DRAG_FULL_MPS) bits |= CREEPING;
    if (this.tensionN > this.breakN) bits |= WEB_BROKEN;
    if (y[at.WOUND]! <= 0) bits |= ROLL_EMPTY;
    if (this.hasDancer) {
      const p = y[at.DANCER]!;
      if (this.stop === 0 ? p < 0 || p > this.travelM : this.dancerN * this.stop < 0)
        bits |= PAST_STOP;
    }
    return bits;
  }

  /** Whether the web has parted or the roll has run out at the last evaluation. */
  endOf(y: Float64Array): 'webBroke' | 'rollEmpty' | null {
    if (this.tensionN > this.breakN) return 'webBroke';
    return y[at.WOUND]! <= 0 ? 'rollEmpty' : null;
  }

  /** Whether the dancer lies at a stop. */
  atStop(): boolean {
    return this.hasDancer && this.stop !== 0;
  }

  private settleDancer(y: Float64Array): void {
    const p = y[at.DANCER]!;
    const q = y[at.DANCER_SPEED]!;
    this.stop = p <= 0 && q <= 0 ? -1 : p >= this.travelM && q >= 0 ? 1 : 0;
    if (this.stop !== 0) y[at.DANCER_SPEED] = 0;
  }

  /** Ripple belongs to a moving nip; within a piece the line moves throughout or not at all. */
  private lineMoves(): boolean {
    const {line, piece} = this;
    const half = (line.ends[piece]! - line.starts[piece]!) / 2;
    return line.c0[piece]! + half * (line.c1[piece]! + half * line.c2[piece]!) > 0;
  }

  private rippleWave(local: number): number {
    const turns = this.state[at.RIPPLE_HZ]! * (this.tickS + local);
    return sine(TWO_PI * (turns - Math.floor(turns)));
  }

  private effectiveRadius(): number {
    const {state} = this;
    const wave = cosine(state[at.THETA]!);
    return this.radius() + outOfRound(state[at.ECCENTRICITY]!, state[at.OVAL]!, wave);
  }

  private pathLength(): number {
    const {state} = this;
    let path = this.spanM;
    if (this.hasDancer) path += 2 * state[at.DANCER]!;
    if (this.runoutM !== 0) path += this.runoutM * cosine(state[at.ROLLER]!);
    return path;
  }

  /** Relaxed length in the span such that the strain gives this tension. */
  private layAt(tensionN: number): void {
    this.state[at.LENGTH] = this.pathLength() / (1 + tensionN / this.stiffnessN);
  }

  /** A flying change keeps the surface speed; one at rest lays the web at its initial tension. */
  private changeRoll(radiusM: number, surfaceMps: number, lineStands: boolean): void {
    const {state} = this;
    state[at.WOUND] = woundLength(this.shape, radiusM);
    if (lineStands && Math.abs(state[at.OMEGA]!) < 1e-3) {
      state[at.OMEGA] = 0;
      this.layAt(this.scenario.initialTensionN);
    } else state[at.OMEGA] = surfaceMps / this.effectiveRadius();
  }
}

/** Keeps an angle within one turn. */
export function withinTurn(angle: number): number {
  return angle - TWO_PI * Math.floor(angle / TWO_PI);
}
