import {type Criterion, type CriterionResult, type MeasureName, type Window} from '#sim-core/index';
import {type Quantity, type UnitSystem, written} from '../units';

const MEASURES: Readonly<Record<MeasureName, {name: string; quantity: Quantity; isMost: boolean}>> =
  {
    inToleranceShare: {name: 'Time in tolerance', quantity: 'share', isMost: false},
    leastN: {name: 'Least tension', quantity: 'tension', isMost: false},
    loopM: {name: 'Loop', quantity: 'loop', isMost: true},
    peakN: {name: 'Peak tension', quantity: 'tension', isMost: true},
    restN: {name: 'Tension at rest', quantity: 'tension', isMost: false},
  };

/** What a criterion asks, as a sentence: "Loop at the stop: at most 5 mm". */
export function criterionSentence(criterion: Criterion, units: UnitSystem): string {
  const {name, quantity, isMost} = MEASURES[criterion.measure];
  const where = windowWords(criterion.window);
  if (criterion.kind === 'mustNot') {
    const limit = written(quantity, criterion.limit, units);
    return `${name} ${where} must never ${isMost ? 'pass' : 'fall below'} ${limit}`;
  }
  return `${name} ${where}: ${isMost ? 'at most' : 'at least'} ${written(quantity, criterion.full, units)}`;
}

/** A measured value of a criterion, with its unit. */
export function criterionValue(
  criterion: Criterion,
  value: number | null,
  units: UnitSystem,
): string {
  return value === null ? '–' : written(MEASURES[criterion.measure].quantity, value, units);
}

/** Why marks were given or lost, in under 25 words. */
export function reasonSentence(
  criterion: Criterion,
  result: Pick<CriterionResult, 'reason' | 'value'>,
  units: UnitSystem,
): string {
  const {measure} = criterion;
  const seen = criterionValue(criterion, result.value, units);
  switch (result.reason) {
    case 'full':
      return 'As asked.';
    case 'kept':
      return 'Kept.';
    case 'notDone':
      return isRestart(criterion.window)
        ? 'No start in the time asked for after a stop from job speed, or it was not run up.'
        : 'No stop from job speed was run to its end.';
    case 'brokeBefore':
      return 'The run ended before this was over, so nothing could be earned.';
    case 'overLimit':
      return `It reached ${seen}. The attempt does not pass, and gets 40 marks at most.`;
    case 'part':
    case 'none':
      return lossSentence(measure, isRestart(criterion.window), seen);
  }
}

function lossSentence(measure: MeasureName, isAtRestart: boolean, seen: string): string {
  switch (measure) {
    case 'loopM':
      return `The roll ran on and threw ${seen} of loose web. It needed more brake, or needed it longer.`;
    case 'leastN':
      return `Tension fell to ${seen}. The brake was too weak for the roll while it slowed down.`;
    case 'peakN':
      return isAtRestart
        ? `The next start pulled ${seen}. The web was loose, or the brake was still pressed.`
        : `Tension rose to ${seen}. The boost pulled harder than the stop needed.`;
    case 'restN':
      return `At rest ${seen} was left.`;
    case 'inToleranceShare':
      return `In tolerance for ${seen} of the time.`;
  }
}

function windowWords(window: Window): string {
  switch (window.kind) {
    case 'times':
      return `from ${window.fromS} to ${window.toS} s`;
    case 'phase':
      return `while ${window.phase}`;
    case 'commands':
      if (isRestart(window)) return 'at the next start';
      return window.from.command === 'run' ? 'at the start' : 'at the stop';
  }
}

function isRestart(window: Window): boolean {
  return window.kind === 'commands' && window.then?.command === 'run';
}
