import {type RunView} from '#sim-core/index';
import {formatted, type Quantity, type UnitSystem, written} from '#shared/units';
import {type LabelPlace} from './layout';

/** A value as it is written beside what it belongs to. */
export interface ShownValue {
  readonly key: LabelPlace;
  readonly number: string;
  readonly unit: string;
  readonly name: string;
  readonly tone: 'ink' | 'measured' | 'output' | 'out';
}

export interface Showing {
  readonly units: UnitSystem;
  readonly showsTruth: boolean;
  /** Band around the target [N]. */
  readonly band: {readonly lowest: number; readonly highest: number} | null;
}

/** The values of a view that people read on the drawing. */
export function valuesOf(view: RunView, {units, showsTruth, band}: Showing): ShownValue[] {
  const make = (
    key: LabelPlace,
    quantity: Quantity,
    si: number,
    name: string,
    tone: ShownValue['tone'] = 'ink',
  ): ShownValue => ({key, ...formatted(quantity, si, units), name, tone});

  const isOut = (tensionN: number): boolean =>
    band !== null && view.lineMps > 0 && (tensionN < band.lowest || tensionN > band.highest);
  const brakeName = `brake, ${written('temperature', view.brakeC, units)}`;
  const measuredTone = isOut(view.measuredN) ? 'out' : 'measured';
  const truthTone = isOut(view.tensionN) ? 'out' : 'ink';
  return [
    make('brake', 'percent', view.outputPct, brakeName, 'output'),
    make('diameter', 'diameter', 2 * view.radiusM, 'roll diameter'),
    make('tension', 'tension', view.measuredN, 'measured tension', measuredTone),
    make('speed', 'speed', view.lineMps, 'line speed'),
    ...(showsTruth ? [make('truth', 'tension', view.tensionN, 'true tension', truthTone)] : []),
  ];
}
