import {
  type Disturbance,
  type Fault,
  type LogEntry,
  type Phase,
  type RunEvent,
} from '#sim-core/index';
import {type UnitSystem, written} from '../units';
import {settingName, settingValue} from './settings';

const PHASE_WORDS: Readonly<Record<Phase, string>> = {
  standstill: 'standstill',
  starting: 'starting',
  running: 'running',
  stopping: 'stopping',
  manual: 'manual',
};

/** A phase as it is called on the screen. */
export function phaseWord(phase: Phase): string {
  return PHASE_WORDS[phase];
}

/** What somebody did, in a few words for a mark on a trend; null for what needs no mark. */
export function entryWords(entry: LogEntry, units: UnitSystem): string | null {
  switch (entry.kind) {
    case 'line':
      if (entry.line.command === 'run')
        return `run ${written('speed', entry.line.speedMps, units)}`;
      return entry.line.command === 'stop' ? 'stop' : 'fast stop';
    case 'set':
      return Object.entries(entry.set)
        .map(([key, value]) => `${settingName(key)} ${settingValue(key, value, units)}`)
        .join(', ');
    case 'disturb':
      return upsetWords(entry.disturb, units);
    default:
      return null;
  }
}

/** What was put in, each thing in a few words: "air lost, zero moved". */
function upsetWords(disturb: Disturbance, units: UnitSystem): string {
  const {radiusM, supply, knownLoadN, rippleMps} = disturb;
  const words = [
    radiusM !== undefined && `roll change to ${written('diameter', 2 * radiusM, units)}`,
    supply !== undefined && supplyWords(supply, units),
    disturb.eccentricityM !== undefined && 'roll out of round',
    disturb.ovalM !== undefined && 'oval roll',
    disturb.zeroN !== undefined && 'zero moved',
    disturb.spanPct !== undefined && 'span moved',
    disturb.modulusPa !== undefined && 'another stiffness of the web',
    (rippleMps !== undefined || disturb.rippleHz !== undefined) && 'ripple of the line speed',
    knownLoadN !== undefined &&
      (knownLoadN === null
        ? 'weight taken off'
        : `weight of ${written('tension', knownLoadN, units)}`),
  ].filter((each) => each !== false);
  return words.length === 0 ? 'upset' : words.join(', ');
}

function supplyWords(supply: number, units: UnitSystem): string {
  if (supply === 0) return 'air lost';
  return supply === 1 ? 'air back' : `air at ${written('share', supply, units)}`;
}

/** What happened by itself, in a few words; null for what needs no mark. */
export function eventWords(event: RunEvent, units: UnitSystem): string | null {
  switch (event.kind) {
    case 'slackBegan':
      return 'web slack';
    case 'stretched':
      return 'web stretched';
    case 'brakeHot':
      return 'brake over its limit';
    case 'dancerStop':
      return 'dancer at a stop';
    case 'webBroke':
      return event.value === undefined
        ? 'web broke'
        : `web broke at ${written('tension', event.value, units)}`;
    case 'rollEmpty':
      return 'roll empty';
    default:
      return null;
  }
}

/** What a screen reader hears of the last event; empty before the first. */
export function spokenWords(last: RunEvent | undefined, units: UnitSystem): string {
  if (last === undefined) return '';
  return last.kind === 'phase' ? `Phase: ${last.phase ?? ''}` : (eventWords(last, units) ?? '');
}

/** Why an act was not done, the setting called by its name. */
export function refusalSentence({path, allowed}: Fault): string {
  const key = path.split('.').at(-1) ?? path;
  return `Not done: ${settingName(key)} allows ${allowed}.`;
}
