import {type Act, type LogEntry, type Note, type RunHash} from './log';
import {type Phase, type TraceBlock} from './trace';

/** Numbers for the picture: the state after the last tick. SI. */
export interface RunView {
  readonly tick: number;
  /** Simulated time [s]. */
  readonly tS: number;
  readonly phase: Phase;
  /** True web tension [N]. */
  readonly tensionN: number;
  /** What the controller measures: the last sample, noise and all [N]; for a dancer 0. */
  readonly sampleN: number;
  /** Sensor's filter state [N]. */
  readonly measuredN: number;
  /** Set point in force [N]. */
  readonly setPointN: number;
  /** Controller output [%]. */
  readonly outputPct: number;
  /** Line speed at the nip [m/s]. */
  readonly lineMps: number;
  /** Speed the line's last command asked for [m/s]; 0 for stops and before the first run. */
  readonly lineTargetMps: number;
  /** Roll speed [rad/s]. */
  readonly rollRadps: number;
  /** Roll angle [rad], 0 … 2π. */
  readonly rollRad: number;
  /** Mean roll radius [m]. */
  readonly radiusM: number;
  /** Web left on the roll [m]. */
  readonly webLeftM: number;
  /** Web above the straight path [m]. */
  readonly slackM: number;
  /** Brake torque [N·m]; at rest the most the brake can hold. */
  readonly torqueNm: number;
  readonly brakeC: number;
  /** Dancer position [m], 0 … travel; 0 for a load cell. */
  readonly dancerM: number;
  /** Whether the line stands (ramp and rounding over). */
  readonly lineStands: boolean;
}

/** Something that happened by itself. `atTick` is the tick after which it was seen; `atS` its time [s]. */
export interface RunEvent {
  readonly kind:
    | 'slackBegan'
    | 'slackEnded'
    | 'stretched'
    | 'brakeHot'
    | 'outputLimitBegan'
    | 'outputLimitEnded'
    | 'dancerStop'
    | 'phase'
    | 'webBroke'
    | 'rollEmpty';
  readonly atTick: number;
  readonly atS: number;
  /** What belongs to it: the tension of a break [N], the length of a loop [m], the limit reached [%]. */
  readonly value?: number;
  /** The new phase, for `phase`. */
  readonly phase?: Phase;
}

/** How a run stands. `diverged`: a state stopped being a finite number. */
export type Outcome =
  | {readonly kind: 'running'}
  | {
      readonly kind: 'webBroke' | 'rollEmpty' | 'diverged';
      readonly atTick: number;
      readonly atS: number;
      /** Tension of the break [N]. */
      readonly tensionN?: number;
    };

/** A state kept by `Run.save`, opaque; only for a run of the same document inside one process. */
export interface SavedRun {
  readonly outcome: Outcome;
}

/** One run of one scenario, live or replayed: the same class, the same path. */
export interface Run {
  readonly tick: number;
  readonly outcome: Outcome;
  /** All events so far, oldest first. */
  readonly events: readonly RunEvent[];
  /** The settings in force, each controller key with its value now. */
  settings(): Readonly<Record<string, unknown>>;
  /** Takes effect in the next tick; returns the stamped entry. Throws ScenarioError for a value out of range. */
  act(act: Act): LogEntry;
  /** Stamps an entry for scoring; the plant does not feel it. */
  note(note: Note): LogEntry;
  /** Runs at most `ticks` control ticks, one row each into `block` when given; stops early at an outcome. Returns the ticks run. */
  advance(ticks: number, block?: TraceBlock): number;
  view(): RunView;
  hash(): RunHash;
  /** Keeps everything the run is made of; `load` takes it back, also in another run of the same document. */
  save(): SavedRun;
  load(saved: SavedRun): void;
}
