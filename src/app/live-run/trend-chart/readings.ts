import {type TraceColumn} from '#sim-core/index';
import {formatted, type Quantity, type UnitSystem} from '#shared/units';
import {type TraceStore} from '../trace/trace-store';
import {type Palette} from './palette';

/** A trace's value at one moment, with what names the trace. */
export interface Reading {
  readonly name: TraceColumn;
  readonly label: string;
  readonly tone: keyof Palette;
  readonly isDashed: boolean;
  readonly number: string;
  readonly unit: string;
}

interface Source {
  readonly name: TraceColumn;
  readonly label: string;
  readonly quantity: Quantity;
  readonly tone: keyof Palette;
  readonly isDashed?: boolean;
}

const TRUTH: Source = {name: 'tensionN', label: 'true', quantity: 'tension', tone: 'ink'};
const SOURCES: readonly Source[] = [
  {name: 'measuredN', label: 'measured', quantity: 'tension', tone: 'measured'},
  {name: 'setPointN', label: 'set point', quantity: 'tension', tone: 'pine', isDashed: true},
  {name: 'outputPct', label: 'brake', quantity: 'percent', tone: 'output'},
  {name: 'lineMps', label: 'line', quantity: 'speed', tone: 'ink'},
  {name: 'radiusM', label: 'roll', quantity: 'diameter', tone: 'muted', isDashed: true},
];

/** Values of all traces in one row, in the order of the plots. */
export function readingsAt(
  trace: TraceStore,
  row: number,
  units: UnitSystem,
  showsTruth: boolean,
): Reading[] {
  const sources = showsTruth ? [TRUTH, ...SOURCES] : SOURCES;
  return sources.map(({name, label, quantity, tone, isDashed = false}) => ({
    name,
    label,
    tone,
    isDashed,
    // a radius is shown as a diameter
    ...formatted(quantity, trace.at(row, name) * (name === 'radiusM' ? 2 : 1), units),
  }));
}
