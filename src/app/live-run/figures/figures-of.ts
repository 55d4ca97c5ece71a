import {
  brakeMovement,
  type LogEntry,
  least,
  loopM,
  type Measured,
  onTargetBy,
  peak,
  shareInTolerance,
  tensionAtRest,
  timeAtLimitS,
  type TraceRows,
} from '#sim-core/index';
import {formatted, type Quantity, type UnitSystem} from '#shared/units';
import {SAMPLE_S} from '../sample-period';

/** One figure as it is shown. */
export interface Figure {
  readonly name: string;
  readonly number: string;
  readonly unit: string;
  readonly isOut: boolean;
}

/** What the figures are measured against [N, %]. */
export interface Yardstick {
  readonly targetN: number;
  readonly toleranceN: number;
  readonly lowestPct: number;
  readonly highestPct: number;
}

/** The act that the figures count from: the last line command or change; null before the first. */
export function lastAct(entries: readonly LogEntry[]): LogEntry | null {
  return (
    entries.findLast(({kind}) => kind === 'line' || kind === 'set' || kind === 'disturb') ?? null
  );
}

/** Figures since the last act. On the free Bench everything is measured on the true tension. */
export function figuresOf(
  rows: TraceRows,
  since: LogEntry | null,
  yardstick: Yardstick,
  units: UnitSystem,
): Figure[] {
  const span = {from: since?.tick ?? 0, to: rows.count};
  const band = {
    lowestN: yardstick.targetN - yardstick.toleranceN,
    highestN: yardstick.targetN + yardstick.toleranceN,
  };
  const show = (
    name: string,
    quantity: Quantity,
    measured: Measured | null,
    isOut = false,
  ): Figure => ({
    name,
    ...(measured === null ? {number: '–', unit: ''} : formatted(quantity, measured.value, units)),
    isOut: isOut && measured !== null,
  });

  const highest = peak(rows, span);
  const lowest = least(rows, span);
  const onTarget = onTargetBy(rows, span, band, SAMPLE_S);
  const loop = loopM(rows, span, SAMPLE_S);
  const common = [
    show('Peak', 'tension', highest, (highest?.value ?? 0) > 1.3 * yardstick.targetN),
    show(
      'Least',
      'tension',
      lowest,
      (lowest?.value ?? yardstick.targetN) < 0.25 * yardstick.targetN,
    ),
    onTarget === null && rows.count > span.from
      ? {name: 'On target by', number: 'not yet', unit: '', isOut: true}
      : show('On target by', 'time', onTarget),
    show('In tolerance', 'share', shareInTolerance(rows, span, band)),
    show('Loop', 'loop', loop, (loop?.value ?? 0) > 0),
    show('Brake movement', 'percent', brakeMovement(rows, span, SAMPLE_S)),
    show('Time at the limit', 'time', timeAtLimitS(rows, span, yardstick, SAMPLE_S)),
  ];
  const isStop = since?.kind === 'line' && since.line.command !== 'run';
  return isStop
    ? [...common, show('Tension at rest', 'tension', tensionAtRest(rows, span, SAMPLE_S))]
    : common;
}
