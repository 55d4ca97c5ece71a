import {type Scenario} from '../scenario/scenario';
import {type Settings} from '../scenario/settings';
import {Points} from '../signal/points';
import * as at from './controller-state';
import * as phases from './phases';
import {clampOutput, pidOutput} from './pid';
import {moveRadius} from './radius';
import {moveSetPoint} from './set-point';

/** What the controller sees in one tick. */
export interface Seen {
  tick: number;
  /** Sample of the load cell [N]. */
  sampleN: number;
  /** Dancer position [% of travel]. */
  dancerPct: number;
  ran: boolean;
  stopped: 'stop' | 'fastStop' | null;
  stands: boolean;
  /** True mean radius [m]. */
  radiusM: number;
  omegaRadps: number;
  /** Line speed without ripple [m/s] and its slope from this tick on [m/s²]. */
  lineMps: number;
  lineSlope: number;
}

/** Inertia of the roll at a radius [kg·m²] = atZero + perFourth·R⁴, as the controller was told. */
export interface InertiaLaw {
  readonly atZero: number;
  readonly perFourth: number;
}

/** The sampled controller: input, phase, set point, radius, output. Its state is the caller's typed array. */
export class Controller {
  private readonly isDancer: boolean;
  private readonly rangeN: number;
  private readonly perTorque: number;
  private gains: Points | null = null;

  constructor(
    scenario: Scenario,
    private readonly state: Float64Array,
    private readonly inertia: InertiaLaw,
  ) {
    const {sensing, brake} = scenario;
    this.isDancer = sensing.kind === 'dancer';
    this.rangeN = sensing.kind === 'loadCell' ? sensing.rangeN : 1;
    this.perTorque = 1 / (brake.maxTorqueNm - (brake.residualTorqueNm ?? 0));
  }

  /** State at power-up. */
  reset(settings: Settings, radiusM: number): void {
    const {state} = this;
    state.fill(0);
    state[at.OUTPUT] = settings.standstillPct;
    state[at.SET_POINT] = settings.setPointN;
    const entered = settings.radiusSource === 'true' ? null : settings.radiusEnteredM;
    state[at.RADIUS] = entered ?? radiusM;
    this.refresh(settings);
  }

  /** Renews what follows from the settings. */
  refresh(settings: Settings): void {
    this.gains = settings.gainByRadius === null ? null : new Points(settings.gainByRadius);
  }

  /** A radius entered by somebody: the one way to set what the controller believes. */
  enterRadius(radiusM: number): void {
    this.state[at.RADIUS] = radiusM;
  }

  /** One control tick; returns the output [%]. */
  tick(settings: Settings, seen: Seen): number {
    const {state, isDancer} = this;
    this.readInput(settings, seen.sampleN);
    const isTaut = !isDancer && state[at.INPUT]! > settings.closeAboveN;
    phases.nextPhase(state, settings, seen.tick, seen, isTaut);
    moveSetPoint(state, settings, seen.tick);
    moveRadius(state, settings, seen);
    const output = this.output(settings, seen);
    state[at.OUTPUT] = output;
    return output;
  }

  private readInput(settings: Settings, sampleN: number): void {
    const {state} = this;
    const {inputFilterS, sampleS} = settings;
    const input =
      (settings.inputSign * (sampleN - settings.zeroAdjustN) * settings.spanAdjustPct) / 100;
    if (inputFilterS > 0 && state[at.HAS_INPUT] === 1)
      state[at.INPUT]! += (sampleS / (sampleS + inputFilterS)) * (input - state[at.INPUT]!);
    else state[at.INPUT] = input;
    state[at.HAS_INPUT] = 1;
  }

  private output(settings: Settings, seen: Seen): number {
    const {state} = this;
    const open = this.openOutput(settings, seen.tick);
    if (open !== null) {
      state[at.CLOSED] = 0;
      state[at.LIMIT] = 0;
      return open;
    }
    const radius = state[at.RADIUS]!;
    return pidOutput(state, settings, {
      y: this.isDancer ? seen.dancerPct : (100 * state[at.INPUT]!) / this.rangeN,
      r: this.isDancer ? 50 : (100 * state[at.SET_POINT]!) / this.rangeN,
      sense: this.isDancer ? -1 : 1,
      kp: this.gains === null ? settings.kp : settings.kp * this.gains.at(radius),
      compensation: settings.radiusCompensation ? radius / settings.radiusRefM! : 1,
      assistPct: this.assist(settings, radius, seen.lineSlope),
    });
  }

  /** The output of a phase in which the loop is open; null while the PID is in charge. */
  private openOutput(settings: Settings, tick: number): number | null {
    const {state} = this;
    switch (state[at.PHASE]) {
      case phases.STANDSTILL:
        return settings.standstillPct;
      case phases.MANUAL:
        return settings.manualPct;
      case phases.STARTING:
        return state[at.RAMPING] === 1 ? null : clampOutput(settings, settings.startOutputPct!);
      case phases.STOPPING: {
        if (phases.holdTime(state, settings) === 0) return null;
        if (!phases.holds(state, settings, tick)) return settings.standstillPct;
        const held = state[at.STOP_OUTPUT]! * phases.holdGain(state, settings);
        return clampOutput(settings, held);
      }
      default:
        return null;
    }
  }

  /** Output that brakes the roll's own inertia while the line slows down [%]. */
  private assist(settings: Settings, radius: number, lineSlope: number): number {
    if (settings.inertiaAssistPct === 0 || !(lineSlope < 0)) return 0;
    const square = radius * radius;
    const inertia = this.inertia.atZero + this.inertia.perFourth * (square * square);
    return settings.inertiaAssistPct * ((inertia * -lineSlope) / radius) * this.perTorque;
  }
}
