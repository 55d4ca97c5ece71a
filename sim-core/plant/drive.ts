import {type BrakeParams} from '../scenario/scenario';

/** Places in the drive's part of the state, before its queue of commands. */
const W = 0; // after play [%]
const STUCK = 1; // after stick [%]
const STARTED = 2;
const SUPPLY = 3; // share of power or air, 0…1
const HALF_PLAY = 4; // [%]
const STICK = 5; // [%]
const QUEUE = 6;

/**
 * From the controller's output to the delayed command of the brake: play, stick, supply, dead time.
 * The queue holds the command of each tick; the delayed one may change between two plant steps of a tick.
 */
export class Drive {
  /** Whole ticks of delay, and the plant steps that are left over. */
  private readonly delayTicks: number;
  /** Plant step of a tick from which on the newer command is in force. */
  readonly changesAtStep: number;
  private readonly length: number;

  static size(deadTimeS: number, plantStepS: number, stepsPerTick: number): number {
    return QUEUE + Drive.queueLength(deadTimeS, plantStepS, stepsPerTick);
  }

  private static queueLength(deadTimeS: number, plantStepS: number, perTick: number): number {
    return Math.floor(delaySteps(deadTimeS, plantStepS) / perTick) + 2;
  }

  constructor(
    private readonly state: Float64Array,
    brake: BrakeParams,
    plantStepS: number,
    stepsPerTick: number,
  ) {
    const deadTimeS = brake.deadTimeS ?? 0;
    const steps = delaySteps(deadTimeS, plantStepS);
    this.delayTicks = Math.floor(steps / stepsPerTick);
    this.changesAtStep = steps - this.delayTicks * stepsPerTick;
    this.length = Drive.queueLength(deadTimeS, plantStepS, stepsPerTick);
  }

  /** Puts in what never changes. Before t = 0 the command was the standstill output. */
  reset(standstillPct: number, {playPct, stickPct}: BrakeParams): void {
    this.state[HALF_PLAY] = (playPct ?? 0) / 2;
    this.state[STICK] = stickPct ?? 0;
    this.state.fill(standstillPct, QUEUE, QUEUE + this.length);
    this.state[W] = standstillPct;
    this.state[STUCK] = standstillPct;
    this.state[STARTED] = 0;
    this.state[SUPPLY] = 1;
  }

  set supply(share: number) {
    this.state[SUPPLY] = share;
  }

  /** Takes the output of one tick. */
  command(tick: number, outputPct: number): void {
    const {state} = this;
    const half = state[HALF_PLAY]!;
    const w = Math.min(Math.max(state[W]!, outputPct - half), outputPct + half);
    state[W] = w;
    if (state[STARTED] === 0 || Math.abs(w - state[STUCK]!) > state[STICK]!) state[STUCK] = w;
    state[STARTED] = 1;
    state[QUEUE + this.slot(tick)] = state[SUPPLY]! * state[STUCK]!;
  }

  /** Delayed command [%] in the early part of the tick, before plant step `changesAtStep`. */
  early(tick: number): number {
    return this.at(tick - this.delayTicks - 1);
  }

  /** Delayed command [%] from plant step `changesAtStep` on. */
  late(tick: number): number {
    return this.at(tick - this.delayTicks);
  }

  private at(tick: number): number {
    return this.state[QUEUE + this.slot(tick + 2 * this.length)]!;
  }

  /** Place of a tick in the queue; the remainder of whole numbers, as that of others is far slower. */
  private slot(tick: number): number {
    return (tick | 0) % this.length;
  }
}

/** Dead time in whole plant steps. */
function delaySteps(deadTimeS: number, plantStepS: number): number {
  return Math.floor(deadTimeS / plantStepS + 0.5);
}
