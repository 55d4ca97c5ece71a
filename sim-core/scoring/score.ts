import {shareInTolerance} from '../measures/band';
import {least, peak} from '../measures/extremes';
import {tensionAtRest} from '../measures/rest';
import {type Measured, placeOf, type Span} from '../measures/rows';
import {loopM} from '../measures/slack';
import {type LogEntry} from '../run/log';
import {replay} from '../run/replay';
import {TraceBlock} from '../run/trace';
import {settingsOf} from '../scenario/settings';
import {
  type Criterion,
  type CriterionResult,
  type MeasureCriterion,
  type MeasureName,
  type MustNotCriterion,
  type ReasonCode,
  type Score,
  type Scored,
  type Target,
} from './criteria';
import {commandsOf, type RunFacts, spanOf} from './windows';

/** Marks at most after a break or a must-not: what was earned before stays, but it does not pass. */
const CAP = 40;
/** Measures where more is better; of the others less is. */
const MORE_IS_BETTER: readonly MeasureName[] = ['leastN', 'restN', 'inToleranceShare'];

/** A score and the run it came from. */
export interface ScoredRun {
  readonly score: Score;
  readonly hash: string;
}

/**
 * Replays a log and scores it. Everything is measured on the true tension, without the sensor's noise, against
 * the exercise's target. Throws ScenarioError for a log that the engine refuses.
 */
export function scoreLog(
  exercise: Scored,
  entries: readonly LogEntry[],
  throughTick: number,
): ScoredRun {
  const block = new TraceBlock(throughTick);
  const run = replay(exercise.scenario, entries, throughTick, block);
  const {sampleS} = settingsOf(exercise.scenario.controller);
  const facts: RunFacts = {
    rows: block,
    commands: commandsOf(exercise.scenario, entries, sampleS),
    sampleS,
    endedEarly: run.outcome.kind !== 'running',
  };
  return {score: scoreRun(exercise, facts), hash: run.hash()};
}

/** Scores a run that was recorded, or is still going on (for the interim marks on the screen). */
export function scoreRun(
  exercise: Pick<Scored, 'criteria' | 'target' | 'passMark'>,
  facts: RunFacts,
): Score {
  const criteria = exercise.criteria.map((criterion, index) =>
    resultOf(criterion, index, exercise.target, facts),
  );
  const sum = criteria.reduce((marks, result) => marks + result.marks, 0);
  const brokeRule = criteria.some(({reason}) => reason === 'overLimit') || facts.endedEarly;
  const score = oneDecimal(brokeRule ? Math.min(CAP, sum) : sum);
  const hasZero = criteria.some(
    ({marks}, index) => exercise.criteria[index]!.kind === 'measure' && marks === 0,
  );
  return {score, passed: score >= exercise.passMark && !hasZero && !brokeRule, criteria};
}

function resultOf(
  criterion: Criterion,
  index: number,
  target: Target,
  facts: RunFacts,
): CriterionResult {
  const span = spanOf(criterion.window, facts);
  const measured = span === null ? null : measure(criterion.measure, span, target, facts);
  if (span === null || measured === null) {
    const reason: ReasonCode = facts.endedEarly ? 'brokeBefore' : 'notDone';
    return {index, value: null, marks: 0, reason, place: null};
  }

  const {value, place} = measured;
  const marks = criterion.kind === 'measure' ? marksFor(criterion, value) : 0;
  const reason =
    criterion.kind === 'measure' ? marksReason(criterion, marks) : limitReason(criterion, value);
  // What was lost by then is lost; what was still to be earned was not earned.
  const isOpen = span.isCut && reason !== 'none' && reason !== 'overLimit';
  if (!isOpen) return {index, value, marks, reason, place};
  const atEnd = placeOf(span.to - 1, span.to - 1, 'tension');
  return {index, value: null, marks: 0, reason: 'brokeBefore', place: atEnd};
}

function marksReason({weight}: MeasureCriterion, marks: number): ReasonCode {
  return marks === weight ? 'full' : marks === 0 ? 'none' : 'part';
}

function limitReason({measure: name, limit}: MustNotCriterion, value: number): ReasonCode {
  const isOver = MORE_IS_BETTER.includes(name) ? value < limit : value > limit;
  return isOver ? 'overLimit' : 'kept';
}

/** Straight line between `zero` (no marks) and `full` (all), flat outside; what lies between has one decimal. */
export function marksFor({full, zero, weight}: MeasureCriterion, value: number): number {
  const share = (value - zero) / (full - zero);
  return share >= 1 ? weight : oneDecimal(weight * Math.max(0, share));
}

function measure(
  name: MeasureName,
  span: Span,
  {tensionN, toleranceN}: Target,
  {rows, sampleS}: RunFacts,
): Measured | null {
  switch (name) {
    case 'peakN':
      return peak(rows, span);
    case 'leastN':
      return least(rows, span);
    case 'loopM':
      return loopM(rows, span, sampleS);
    case 'restN':
      return tensionAtRest(rows, span, sampleS);
    case 'inToleranceShare':
      return shareInTolerance(rows, span, {
        lowestN: tensionN - toleranceN,
        highestN: tensionN + toleranceN,
      });
  }
}

function oneDecimal(value: number): number {
  return Math.round(value * 10) / 10;
}
