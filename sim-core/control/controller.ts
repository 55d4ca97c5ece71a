import {type Scenario} from '../scenario/scenario';
import {type Settings} from '../scenario/settings';
import {Points} from '../signal/points';
import * as at from './controller-state';
import * as phases from './phases';
import {pidOutput} from './pid';
import {moveRadius} from './radius';
import * as seen from './seen';
import {moveSetPoint} from './set-point';
import * as set from './tuning';

/** Places of what the document fixes for the controller. */
const PER_RANGE = 0; // 100/range [%/N]
const PER_TORQUE = 1; // 1/(τ_max − τ_res) [1/(N·m)]
const INERTIA_AT_ZERO = 2; // J = this + INERTIA_PER_FOURTH·R⁴ [kg·m²]
const INERTIA_PER_FOURTH = 3;

/** Inertia of the roll at a radius [kg·m²] = atZero + perFourth·R⁴, as the controller was told. */
export interface InertiaLaw {
  readonly atZero: number;
  readonly perFourth: number;
}

/** The sampled controller: input, phase, set point, radius, output. Its state is the caller's typed array. */
export class Controller {
  /** What it sees; the caller fills it in before each tick. */
  readonly news = new Float64Array(seen.SEEN_SIZE);
  readonly tuning = new Float64Array(set.TUNING_SIZE);
  private readonly fixed = new Float64Array(4);
  private readonly isDancer: boolean;
  private gains: Points | null = null;

  constructor(
    {sensing, brake}: Scenario,
    private readonly state: Float64Array,
    inertia: InertiaLaw,
  ) {
    this.isDancer = sensing.kind === 'dancer';
    this.news[seen.SENSE] = this.isDancer ? -1 : 1;
    this.fixed[PER_RANGE] = sensing.kind === 'loadCell' ? 100 / sensing.rangeN : 0;
    this.fixed[PER_TORQUE] = 1 / (brake.maxTorqueNm - (brake.residualTorqueNm ?? 0));
    this.fixed[INERTIA_AT_ZERO] = inertia.atZero;
    this.fixed[INERTIA_PER_FOURTH] = inertia.perFourth;
  }

  /** State at power-up. */
  reset(settings: Settings, radiusM: number): void {
    const {state} = this;
    state.fill(0);
    state[at.OUTPUT] = settings.standstillPct;
    state[at.APPLIED] = settings.standstillPct;
    state[at.SET_POINT] = settings.setPointN;
    const entered = settings.radiusSource === 'true' ? null : settings.radiusEnteredM;
    state[at.RADIUS] = entered ?? radiusM;
    this.refresh(settings);
  }

  /** Takes the settings in force. */
  refresh(settings: Settings): void {
    set.tune(this.tuning, settings);
    this.gains = settings.gainByRadius === null ? null : new Points(settings.gainByRadius);
  }

  /** A radius entered by somebody: the one way to set what the controller believes. */
  enterRadius(radiusM: number): void {
    this.state[at.RADIUS] = radiusM;
  }

  /** Whether nothing is asked for but a PID with one gain, or one that goes with the true radius. */
  isPlain(): boolean {
    const {tuning, gains} = this;
    return (
      gains === null &&
      tuning[set.SOURCE] === set.TRUE_RADIUS &&
      tuning[set.IS_MANUAL] === 0 &&
      tuning[set.OUT_RATE] === 0 &&
      tuning[set.OUT_STEP] === 0
    );
  }

  /** The limit [%] at which the output is, when it is at one. */
  limitPct(): number {
    return this.state[at.LIMIT]! > 0 ? this.tuning[set.OUT_MAX]! : this.tuning[set.OUT_MIN]!;
  }

  /** One control tick; the output lies in the state. */
  tick(): void {
    const {state, tuning, news} = this;
    this.readInput();
    const isTaut = !this.isDancer && state[at.INPUT]! > tuning[set.CLOSE_ABOVE]!;
    phases.nextPhase(state, tuning, news, isTaut);
    moveSetPoint(state, tuning, news[seen.TICK]!);
    moveRadius(state, tuning, news);
    if (this.isClosed()) {
      this.prepare();
      state[at.OUTPUT] = pidOutput(state, tuning, news);
    } else {
      state[at.OUTPUT] = this.openOutput();
      state[at.CLOSED] = 0;
      state[at.LIMIT] = 0;
    }
    state[at.APPLIED] = set.applied(tuning, state[at.OUTPUT]);
  }

  private readInput(): void {
    const {state, tuning, news} = this;
    const input = (news[seen.SAMPLE_N]! - tuning[set.ZERO_ADJUST]!) * tuning[set.INPUT_GAIN]!;
    const filterS = tuning[set.INPUT_FILTER_S]!;
    const sampleS = tuning[set.SAMPLE_S]!;
    if (filterS > 0 && state[at.HAS_INPUT] === 1)
      state[at.INPUT]! += (sampleS / (sampleS + filterS)) * (input - state[at.INPUT]!);
    else state[at.INPUT] = input;
    state[at.HAS_INPUT] = 1;
  }

  /** Whether the PID is in charge of this phase. */
  private isClosed(): boolean {
    const {state, tuning} = this;
    const phase = state[at.PHASE];
    if (phase === phases.STARTING) return state[at.RAMPING] === 1;
    if (phase === phases.STOPPING) return phases.holdTime(state, tuning) === 0;
    return phase === phases.RUNNING;
  }

  /** Output of a phase in which the loop is open. */
  private openOutput(): number {
    const {state, tuning} = this;
    const phase = state[at.PHASE];
    if (phase === phases.MANUAL) return tuning[set.MANUAL_PCT]!;
    if (phase === phases.STARTING) return set.clampOutput(tuning, tuning[set.START_PCT]!);
    if (phase === phases.STOPPING && phases.holds(state, tuning, this.news[seen.TICK]!))
      return set.clampOutput(tuning, state[at.STOP_OUTPUT]! * phases.holdGain(state, tuning));
    return tuning[set.STANDSTILL_PCT]!;
  }

  /** What the PID works with in this tick. */
  private prepare(): void {
    const {state, tuning, news, gains, fixed} = this;
    const radius = state[at.RADIUS]!;
    const perReference = tuning[set.PER_REFERENCE]!;
    const perRange = fixed[PER_RANGE]!;
    news[seen.Y] = this.isDancer ? news[seen.DANCER_PCT]! : perRange * state[at.INPUT]!;
    news[seen.R] = this.isDancer ? 50 : perRange * state[at.SET_POINT]!;
    news[seen.GAIN] = gains === null ? tuning[set.KP]! : tuning[set.KP]! * gains.at(radius);
    news[seen.COMPENSATION] = perReference === 0 ? 1 : radius * perReference;
    news[seen.ASSIST_PCT] = this.assist(radius);
  }

  /** Output that brakes the roll's own inertia while the line slows down [%]. */
  private assist(radius: number): number {
    const {tuning, fixed} = this;
    const slope = this.news[seen.LINE_SLOPE]!;
    if (tuning[set.ASSIST] === 0 || !(slope < 0)) return 0;
    const square = radius * radius;
    const inertia = fixed[INERTIA_AT_ZERO]! + fixed[INERTIA_PER_FOURTH]! * (square * square);
    return tuning[set.ASSIST]! * ((inertia * -slope) / radius) * fixed[PER_TORQUE]!;
  }
}
