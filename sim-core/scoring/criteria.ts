import {type TrendPlace} from '../run/log';
import {type Phase} from '../run/trace';
import {type Scenario} from '../scenario/scenario';

/** What an attempt is scored by; the parts of an exercise that scoring needs. */
export interface Scored {
  readonly scenario: Scenario;
  readonly target: Target;
  readonly criteria: readonly Criterion[];
  readonly passMark: number;
}

/** What an exercise asks of the web, fixed whatever set point is entered. */
export interface Target {
  readonly tensionN: number;
  /** Tolerance to either side [N], > 0. */
  readonly toleranceN: number;
}

/** A line command of the run, counted among those that qualify; −1 is the last. */
export interface CommandRef {
  readonly command: 'run' | 'stop' | 'fastStop';
  readonly nth: number;
  /** Only commands given at this line speed or more [m/s]. */
  readonly fromSpeedMps?: number;
}

/** The part of a run a criterion looks at. Times in simulated seconds. */
export type Window =
  | {readonly kind: 'times'; readonly fromS: number; readonly toS: number}
  | {readonly kind: 'phase'; readonly phase: Phase; readonly nth: number}
  | {
      readonly kind: 'commands';
      readonly from: CommandRef;
      /** The next command of this kind after `from` opens the window instead, when given (a restart after a stop). */
      readonly then?: {
        readonly command: 'run' | 'stop';
        readonly withinS: readonly [number, number];
      };
      /** End: the next line command of any kind, or this many seconds, whichever is first. */
      readonly forS?: number;
      /** A shorter window says nothing: counts as not done. */
      readonly atLeastS?: number;
    };

export type MeasureName = 'peakN' | 'leastN' | 'loopM' | 'restN' | 'inToleranceShare';

/** Marks between `zero` (none) and `full` (all), straight between. SI. */
export interface MeasureCriterion {
  readonly kind: 'measure';
  readonly measure: MeasureName;
  readonly window: Window;
  readonly full: number;
  readonly zero: number;
  /** Marks at most. */
  readonly weight: number;
}

/** Never beyond `limit`: the attempt does not pass and is capped at 40. */
export interface MustNotCriterion {
  readonly kind: 'mustNot';
  readonly measure: MeasureName;
  readonly window: Window;
  readonly limit: number;
}

export type Criterion = MeasureCriterion | MustNotCriterion;

/**
 * Why marks were given or lost; words are made in shared/wording. `notDone`: the run has no such part.
 * `brokeBefore`: the run ended before or inside it, so that nothing could be earned.
 */
export type ReasonCode =
  'full' | 'part' | 'none' | 'notDone' | 'brokeBefore' | 'kept' | 'overLimit';

export interface CriterionResult {
  /** Place in the exercise's list. */
  readonly index: number;
  /** Measured value (SI); null when there was nothing to measure. */
  readonly value: number | null;
  readonly marks: number;
  readonly reason: ReasonCode;
  /** Where on the trend it was seen. */
  readonly place: TrendPlace | null;
}

export interface Score {
  /** 0.0 … 100.0, one decimal. */
  readonly score: number;
  readonly passed: boolean;
  readonly criteria: readonly CriterionResult[];
}
