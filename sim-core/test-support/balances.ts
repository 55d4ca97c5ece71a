import * as now from '../plant/evaluation';
import {fixRoll, inertia, woundLength} from '../plant/roll';
import {type Scenario} from '../scenario/scenario';

/** Web stiffness EA [N]. */
export function stiffnessOf({web}: Scenario): number {
  return web.modulusPa * web.widthM * web.thicknessM;
}

/** Inertia of roll and core at a mean radius [kg·m²], by the engine's law. */
export function inertiaOf(scenario: Scenario, radiusM: number): number {
  return inertia(rollOf(scenario), radiusM * radiusM);
}

/** Relaxed length on the roll at a mean radius [m], by the engine's law. */
export function woundOf(scenario: Scenario, radiusM: number): number {
  return woundLength(rollOf(scenario), radiusM);
}

function rollOf(scenario: Scenario): Float64Array {
  const n = new Float64Array(now.EVALUATION_SIZE);
  fixRoll(n, scenario);
  return n;
}
