import {type Attempt} from '#shared/attempts/attempt';
import {type UnitSystem} from '#shared/units';
import {criterionSentence, criterionValue, reasonSentence} from '#shared/wording/criteria';
import {type PlaceNumber} from '../../live-run/trend-chart/trend-marks';

/** One criterion with what came of it, in words. */
export interface ResultLine {
  readonly number: number;
  readonly sentence: string;
  readonly value: string;
  readonly reason: string;
  /** Marks of a measure; null for a must-not. */
  readonly marks: number | null;
  readonly weight: number;
  /** Where the value lies between none (0) and full (1). */
  readonly share: number | null;
  readonly ends: readonly [string, string];
  readonly isLost: boolean;
}

/** Lines of a scored attempt; must-nots only when they were broken. */
export function linesOf(attempt: Attempt | null, units: UnitSystem): ResultLine[] {
  if (attempt?.result == null) return [];
  const {criteria} = attempt.exerciseDocument;
  return attempt.result.criteria.flatMap((result, place) => {
    const criterion = criteria[result.index];
    if (criterion === undefined) return [];
    const isMeasure = criterion.kind === 'measure';
    if (!isMeasure && result.reason !== 'overLimit') return [];
    return [
      {
        number: place + 1,
        sentence: criterionSentence(criterion, units),
        value: criterionValue(criterion, result.value, units),
        reason: reasonSentence(criterion, result, units),
        marks: isMeasure ? result.marks : null,
        weight: isMeasure ? criterion.weight : 0,
        share: isMeasure ? result.marks / criterion.weight : null,
        ends: isMeasure
          ? [
              criterionValue(criterion, criterion.zero, units),
              criterionValue(criterion, criterion.full, units),
            ]
          : ['', ''],
        isLost: result.reason === 'overLimit' || (isMeasure && result.marks === 0),
      },
    ];
  });
}

/** Where marks were lost, by the number of the line. */
export function numbersOf(attempt: Attempt | null): PlaceNumber[] {
  return (attempt?.result?.criteria ?? []).flatMap(({place, reason}, index) =>
    place === null || reason === 'full' || reason === 'kept'
      ? []
      : [{tick: place.fromTick, number: index + 1}],
  );
}

/** Why a scored attempt does not pass; empty when it does. */
export function whyNotPassed(attempt: Attempt | null): string {
  if (attempt?.result == null || attempt.result.passed) return '';
  const {passMark} = attempt.exerciseDocument;
  const {criteria, score} = attempt.result;
  if (criteria.some(({reason}) => reason === 'overLimit')) {
    return 'A limit that must never be passed was passed.';
  }
  if (criteria.some(({reason}) => reason === 'brokeBefore')) {
    return 'The run ended early, so it does not pass.';
  }
  if (score >= passMark) return `${passMark} passes, but one line is at zero.`;
  return `${passMark} passes, with no line at zero.`;
}
