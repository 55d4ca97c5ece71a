import {type Disturbance, type LineCommand, type LiveSettings} from '../scenario/scenario';

/** What somebody does to the plant or its controller. One `set` holds all keys changed by one act. */
export type Act =
  {readonly set: LiveSettings} | {readonly line: LineCommand} | {readonly disturb: Disturbance};

/** A place on a trend: from and through a control tick, on one trace. */
export interface TrendPlace {
  readonly fromTick: number;
  readonly toTick: number;
  readonly trace: 'tension' | 'measured' | 'setPoint' | 'output' | 'line';
}

/** What is written down for scoring only; the engine does not feel it. */
export type Note =
  | {readonly kind: 'pause'}
  | {readonly kind: 'resume'}
  | {readonly kind: 'factor'; readonly factor: number}
  | {readonly kind: 'hint'; readonly hint: number}
  | {readonly kind: 'answer'; readonly question: number; readonly answer: string | number}
  | {readonly kind: 'namedFault'; readonly fault: string; readonly place?: TrendPlace}
  | {readonly kind: 'end'; readonly hash: RunHash};

/** Two unsigned 32-bit numbers over the state bits of every tick, as 16 hexadecimal digits. */
export type RunHash = string;

/** `n` counts from 1 without gaps; `tick` is the control tick the entry took effect in, never falling. */
export interface Stamp {
  readonly n: number;
  readonly tick: number;
}

/** An entry the engine acts on. */
export type EngineEntry =
  | (Stamp & {readonly kind: 'set'; readonly set: LiveSettings})
  | (Stamp & {readonly kind: 'line'; readonly line: LineCommand})
  | (Stamp & {readonly kind: 'disturb'; readonly disturb: Disturbance});

/** One line of a run's log. */
export type LogEntry = EngineEntry | (Stamp & Note);
