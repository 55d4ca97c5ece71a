import {type Band, onTargetBy, shareInTolerance} from './band';
import {hottest, least, peak} from './extremes';
import {absoluteErrorNs, brakeEnergyJ, stretchedM, timedErrorNs2} from './integrals';
import {oscillation} from './oscillation';
import {brakeMovement, greatestOutputPct, timeAtLimitS} from './output';
import {tensionAtRest} from './rest';
import {type Measured, type Span, type TraceRows} from './rows';
import {loopM, runOnM} from './slack';
import {overshootPct, riseTimeS, type Step} from './step';

/** What a window is measured against. */
export interface MeasuredAgainst {
  readonly sampleS: number;
  /** Job target, or the set point where there is none [N]. */
  readonly targetN: number;
  /** Tolerance band; ±5 % of the target when left out. */
  readonly band?: Band;
  /** Limits of the output [%]. */
  readonly lowestPct: number;
  readonly highestPct: number;
  /** Target before the window [N]: only for a change of target. */
  readonly stepFromN?: number;
  /** Tension at which the web is stretched to its limit [N]; none: no such length. */
  readonly stretchLimitN?: number;
}

/** Every measure of one window, in SI with the unit in the name; null where it does not apply. */
export interface Measures {
  readonly peakN: number | null;
  readonly peakPct: number | null;
  readonly leastN: number | null;
  readonly leastPct: number | null;
  readonly overshootPct: number | null;
  readonly onTargetByS: number | null;
  readonly riseTimeS: number | null;
  readonly iaeNs: number | null;
  readonly itaeNs2: number | null;
  readonly inTolerancePct: number | null;
  readonly brakeMovementPctPerS: number | null;
  readonly atLimitS: number | null;
  readonly greatestOutputPct: number | null;
  readonly loopM: number | null;
  readonly runOnM: number | null;
  readonly restN: number | null;
  readonly brakeEnergyJ: number | null;
  readonly hottestC: number | null;
  readonly stretchedM: number | null;
  readonly swingPeriodS: number | null;
  readonly swingN: number | null;
  readonly decayRatio: number | null;
}

/** All measures of a window: rows from a command or change up to the next. */
export function measuresOf(rows: TraceRows, span: Span, against: MeasuredAgainst): Measures {
  const {sampleS, targetN, stepFromN, stretchLimitN} = against;
  const band = against.band ?? {lowestN: 0.95 * targetN, highestN: 1.05 * targetN};
  const step: Step | null = stepFromN === undefined ? null : {fromN: stepFromN, toN: targetN};
  const highest = valueOf(peak(rows, span));
  const lowest = valueOf(least(rows, span));
  const share = valueOf(shareInTolerance(rows, span, band));
  const swing = oscillation(rows, span, sampleS);
  const ofTarget = (valueN: number | null): number | null =>
    valueN === null || targetN === 0 ? null : (100 * valueN) / targetN;
  return {
    peakN: highest,
    peakPct: ofTarget(highest),
    leastN: lowest,
    leastPct: ofTarget(lowest),
    overshootPct: step === null ? null : valueOf(overshootPct(rows, span, step)),
    onTargetByS: valueOf(onTargetBy(rows, span, band, sampleS)),
    riseTimeS: step === null ? null : valueOf(riseTimeS(rows, span, step, sampleS)),
    iaeNs: valueOf(absoluteErrorNs(rows, span, targetN, sampleS)),
    itaeNs2: valueOf(timedErrorNs2(rows, span, targetN, sampleS)),
    inTolerancePct: share === null ? null : 100 * share,
    brakeMovementPctPerS: valueOf(brakeMovement(rows, span, sampleS)),
    atLimitS: valueOf(timeAtLimitS(rows, span, against, sampleS)),
    greatestOutputPct: valueOf(greatestOutputPct(rows, span)),
    loopM: valueOf(loopM(rows, span, sampleS)),
    runOnM: valueOf(runOnM(rows, span, sampleS)),
    restN: valueOf(tensionAtRest(rows, span, sampleS)),
    brakeEnergyJ: valueOf(brakeEnergyJ(rows, span, sampleS)),
    hottestC: valueOf(hottest(rows, span)),
    stretchedM:
      stretchLimitN === undefined ? null : valueOf(stretchedM(rows, span, stretchLimitN, sampleS)),
    swingPeriodS: swing?.periodS ?? null,
    swingN: swing?.amplitudeN ?? null,
    decayRatio: swing?.decayRatio ?? null,
  };
}

function valueOf(measured: Measured | null): number | null {
  return measured?.value ?? null;
}
