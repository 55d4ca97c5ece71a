import {type Phase, PHASES, type RunEvent} from '#sim-core/index';
import {type UnitSystem} from '#shared/units';
import {type TraceStore} from '../trace/trace-store';
import {type Mark, type PlaceNumber} from './trend-marks';

/** A stretch of ticks in one phase; the last one has no end yet. */
export interface PhaseSpan {
  readonly phase: Phase;
  readonly fromTick: number;
  readonly toTick: number;
}

/** Everything that one drawing of the trends shows. */
export interface TrendScene {
  readonly trace: TraceStore;
  /** The window [s]. */
  readonly fromS: number;
  readonly toS: number;
  readonly units: UnitSystem;
  readonly showsTruth: boolean;
  /** Tolerance around the target [N]. */
  readonly band: {readonly lowest: number; readonly highest: number} | null;
  /** Tension that fills the plot [N]; null fits the scale to what is seen. */
  readonly topN: number | null;
  readonly topSpeedMps: number;
  readonly largestRadiusM: number;
  readonly marks: readonly Mark[];
  readonly numbers: readonly PlaceNumber[];
  readonly phases: readonly PhaseSpan[];
  /** Whether there is room for names beside the traces. */
  readonly namesTraces: boolean;
}

/** Phases of a run in their order, from its events. */
export function phaseSpans(events: readonly RunEvent[], trace: TraceStore): PhaseSpan[] {
  const changes = events.flatMap(({kind, phase, atTick}) =>
    kind === 'phase' && phase !== undefined ? [{phase, fromTick: atTick}] : [],
  );
  const first = PHASES[trace.at(0, 'phase')] ?? 'standstill';
  const spans = [{phase: first, fromTick: 0}, ...changes];
  return spans.map((span, place) => ({...span, toTick: spans[place + 1]?.fromTick ?? Infinity}));
}
