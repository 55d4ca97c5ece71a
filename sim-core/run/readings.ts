import * as control from '../control/controller-state';
import * as place from '../plant/plant-state';
import {type Plant} from '../plant/plant';
import {type RunView} from './run';
import {COLUMN, PHASES, TRACE_COLUMNS, type TraceBlock} from './trace';

/** What there is to read of a run. */
export interface Parts {
  readonly plant: Plant;
  readonly plantState: Float64Array;
  readonly controlState: Float64Array;
}

/** Numbers for the picture: the state after `tick` ticks. */
export function viewOf(
  {plant, plantState: p, controlState: c}: Parts,
  tick: number,
  sampleS: number,
  sampleN: number,
): RunView {
  const tS = tick * sampleS;
  return {
    tick,
    tS,
    phase: PHASES[c[control.PHASE]!]!,
    tensionN: p[place.TENSION]!,
    sampleN,
    measuredN: p[place.FILTER]!,
    setPointN: c[control.SET_POINT]!,
    outputPct: c[control.APPLIED]!,
    lineMps: plant.line.speedAt(tS),
    lineTargetMps: plant.line.targetMps,
    rollRadps: p[place.OMEGA]!,
    rollRad: p[place.THETA]!,
    radiusM: plant.stand.radius(),
    webLeftM: p[place.WOUND]!,
    slackM: plant.stand.slack(),
    torqueNm: plant.stand.torque(),
    brakeC: p[place.HEAT]!,
    dancerM: p[place.DANCER]!,
    lineStands: plant.line.stands(tS),
  };
}

/** Begins the row of the tick at `t`: the plant before the tick's commands, and the output in force until now. */
export function writePlant(block: TraceBlock, parts: Parts, t: number): void {
  const {plant, plantState: p, controlState: c} = parts;
  const row = block.count * TRACE_COLUMNS.length;
  const {rows} = block;
  rows[row + COLUMN.tensionN] = p[place.TENSION]!;
  rows[row + COLUMN.measuredN] = p[place.FILTER]!;
  rows[row + COLUMN.outputPct] = c[control.APPLIED]!;
  rows[row + COLUMN.lineMps] = plant.line.speedAt(t);
  rows[row + COLUMN.rollRadps] = p[place.OMEGA]!;
  rows[row + COLUMN.radiusM] = plant.stand.radius();
  rows[row + COLUMN.slackM] = plant.stand.slack();
  rows[row + COLUMN.torqueNm] = plant.stand.torque();
  rows[row + COLUMN.brakeC] = p[place.HEAT]!;
  rows[row + COLUMN.dancerM] = p[place.DANCER]!;
}

/** Ends the row: set point and phase of the tick itself. */
export function writeControl(block: TraceBlock, {controlState: c}: Parts): void {
  const row = block.count * TRACE_COLUMNS.length;
  block.rows[row + COLUMN.setPointN] = c[control.SET_POINT]!;
  block.rows[row + COLUMN.phase] = c[control.PHASE]!;
  block.count++;
}
