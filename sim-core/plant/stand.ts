import {type Disturbance, type LoadCellParams, type Scenario} from '../scenario/scenario';
import {cosine, TWO_PI} from '../signal/sine';
import {fade, grip, lagsOf} from './brake';
import {type Equations} from './equations';
import * as now from './evaluation';
import * as at from './plant-state';
import {outOfRound, radiusSquare, woundLength} from './roll';
import {ceiling, MOST_PARTS, paceOf} from './stiffness';

/** Steps in time: the control tick and the plant steps in it. */
export interface Grid {
  readonly sampleS: number;
  readonly plantStepS: number;
  readonly stepsPerTick: number;
}

/**
 * What vibrates or turns does so by this much in a step at most [rad], for its phase to stay right. A dancer on its
 * web vibrates quickly and not for long.
 */
const FINE = {loadCell: 0.12, dancer: 0.2};

/** A step is this share of a lag at most. */
const LAG_SHARE = 0.4;

/** Plant steps that one step of the integration may take together where everything is slow. */
const MERGED = 2;

/** Roll speed below which a roll change counts as one at rest [rad/s]. */
const AT_REST_RADPS = 1e-3;

/** The stand as it is set up, disturbed and looked at; `Equations` says how it moves. */
export class Stand {
  /** Steps a second that the present stiffness asks for, and the lags. */
  private readonly stepsPerS = new Float64Array(1);

  constructor(
    private readonly scenario: Scenario,
    private readonly state: Float64Array,
    private readonly equations: Equations,
    private readonly grid: Grid,
  ) {}

  /** State at t = 0: everything at rest, the web at its initial tension. */
  reset(): void {
    const {state, scenario, equations} = this;
    const {web, roll, sensing, initialTensionN} = scenario;
    const cell: Partial<LoadCellParams> = sensing.kind === 'loadCell' ? sensing : {};
    state.fill(0);
    state[at.MODULUS] = web.modulusPa;
    state[at.ECCENTRICITY] = roll.eccentricityM ?? 0;
    state[at.OVAL] = roll.ovalM ?? 0;
    state[at.ZERO] = cell.zeroN ?? 0;
    state[at.SPAN_PCT] = cell.spanPct ?? 100;
    state[at.WOUND] = woundLength(equations.now, roll.radiusM);
    state[at.LARGEST] = roll.radiusM;
    state[at.HEAT] = equations.now[now.AMBIENT]!;
    state[at.DANCER] = equations.now[now.TRAVEL]! / 2;
    this.refresh();
    this.layAt(initialTensionN);
    state[at.TENSION] = initialTensionN;
    state[at.STRAIN] = initialTensionN / equations.now[now.STIFFNESS]!;
    if (!equations.hasDancer) state[at.FILTER] = equations.signal(initialTensionN);
  }

  /** Renews what follows from the state: after a disturbance and after a load. */
  refresh(): void {
    const {state} = this;
    this.equations.refresh();
    const {sensing} = this.scenario;
    const pace = paceOf(this.scenario, state[at.MODULUS]!, state[at.LARGEST]!);
    const filterS = sensing.kind === 'loadCell' ? sensing.filterS : 0;
    this.stepsPerS[0] = Math.max(
      pace.rate,
      pace.vibration / FINE[sensing.kind],
      ...lagsOf(this.scenario.brake).map((lagS) => (lagS > 0 ? 1 / (LAG_SHARE * lagS) : 0)),
      filterS > 0 ? 1 / (LAG_SHARE * filterS) : 0,
    );
  }

  /**
   * Steps that the coming tick is divided into: as many as the stiffness and everything that turns ask for,
   * at least one for MERGED plant steps, at most MOST_PARTS for one.
   */
  stepsInTick(): number {
    const {state, equations, grid} = this;
    const {now: n} = equations;
    let turning = 0; // fastest [rad/s]
    if (n[now.OUT_OF_ROUND] === 1) turning = 2 * Math.abs(state[at.OMEGA]!);
    if (equations.hasRunout) turning = Math.max(turning, Math.abs(n[now.C0]!) * n[now.PER_ROLLER]!);
    if (state[at.RIPPLE] !== 0) turning = Math.max(turning, TWO_PI * state[at.RIPPLE_HZ]!);
    const asked = ceiling(grid.sampleS * Math.max(this.stepsPerS[0]!, turning / FINE.loadCell));
    const least = ceiling(grid.stepsPerTick / MERGED);
    return Math.min(Math.max(asked, least), MOST_PARTS * grid.stepsPerTick);
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
    return Math.sqrt(radiusSquare(this.equations.now, this.state[at.WOUND]!));
  }

  /** Web above the straight path [m]. */
  slack(): number {
    return Math.max(0, this.state[at.LENGTH]! - this.pathLength());
  }

  /** Torque of the brake [N·m]; at rest the most it can hold. */
  torque(): number {
    const {state} = this;
    const {now: n, curve} = this.equations;
    const cold = n[now.RESIDUAL]! + n[now.TORQUE_SPAN]! * curve.at(state[at.DRIVE]!);
    return cold * fade(n, state[at.HEAT]!) * grip(n, state[at.OMEGA]!);
  }

  private effectiveRadius(): number {
    const {state} = this;
    const wave = cosine(state[at.THETA]!);
    return this.radius() + outOfRound(state[at.ECCENTRICITY]!, state[at.OVAL]!, wave);
  }

  private pathLength(): number {
    const {state, equations} = this;
    let path = equations.now[now.SPAN_M]!;
    if (equations.hasDancer) path += 2 * state[at.DANCER]!;
    if (equations.hasRunout) path += equations.now[now.RUNOUT]! * cosine(state[at.ROLLER]!);
    return path;
  }

  /** Relaxed length in the span such that the strain gives this tension. */
  private layAt(tensionN: number): void {
    const strain = tensionN / this.equations.now[now.STIFFNESS]!;
    this.state[at.LENGTH] = this.pathLength() / (1 + strain);
    this.state[at.RELAXED] = strain; // it has lain long enough
  }

  /** A flying change keeps the surface speed; one at rest lays the web at its initial tension. */
  private changeRoll(radiusM: number, surfaceMps: number, lineStands: boolean): void {
    const {state} = this;
    state[at.WOUND] = woundLength(this.equations.now, radiusM);
    if (lineStands && Math.abs(state[at.OMEGA]!) < AT_REST_RADPS) {
      state[at.OMEGA] = 0;
      this.layAt(this.scenario.initialTensionN);
    } else state[at.OMEGA] = surfaceMps / this.effectiveRadius();
  }
}

/** Keeps an angle within one turn. */
export function withinTurn(angle: number): number {
  return angle - TWO_PI * Math.floor(angle / TWO_PI);
}
