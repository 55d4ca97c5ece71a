import {type Span, type TraceRows} from '../measures/rows';
import {type LogEntry} from '../run/log';
import {PHASES} from '../run/trace';
import {tickOf} from '../scenario/read-scenario';
import {type Scenario} from '../scenario/scenario';
import {type CommandRef, type Window} from './criteria';

/** A line command of a run, whoever gave it. */
export interface GivenCommand {
  readonly tick: number;
  readonly command: 'run' | 'stop' | 'fastStop';
}

/** What windows are found in. */
export interface RunFacts {
  readonly rows: TraceRows;
  readonly commands: readonly GivenCommand[];
  readonly sampleS: number;
  /** Whether the web broke or the roll ran empty: the rows end there. */
  readonly endedEarly: boolean;
}

/** The rows a criterion looks at. */
export interface FoundSpan extends Span {
  /** Whether the run ended early inside the window: what would have come after is not known. */
  readonly isCut: boolean;
}

/** All line commands in order: the scenario's own programme first within a tick, then the log. */
export function commandsOf(
  scenario: Scenario,
  entries: readonly LogEntry[],
  sampleS: number,
): GivenCommand[] {
  const programme = scenario.line.map(({atS, command}) => ({
    tick: tickOf(atS, sampleS),
    command,
  }));
  const given = entries.flatMap((entry) =>
    entry.kind === 'line' ? [{tick: entry.tick, command: entry.line.command}] : [],
  );
  return [...programme, ...given].sort((a, b) => a.tick - b.tick);
}

/** The rows a criterion looks at; null when the run has no such part. */
export function spanOf(window: Window, facts: RunFacts): FoundSpan | null {
  switch (window.kind) {
    case 'times':
      return within(facts, window.fromS / facts.sampleS, window.toS / facts.sampleS);
    case 'phase':
      return phaseSpan(window, facts);
    case 'commands':
      return commandSpan(window, facts);
  }
}

function commandSpan(window: Window & {kind: 'commands'}, facts: RunFacts): FoundSpan | null {
  const {commands, sampleS} = facts;
  let place = placeOf(window.from, facts);
  if (place === null) return null;

  if (window.then !== undefined) {
    const {command, withinS} = window.then;
    const first = commands[place]!.tick;
    const next = commands.findIndex((given, at) => at > place! && given.command === command);
    if (next < 0) return null;
    const waitedS = (commands[next]!.tick - first) * sampleS;
    if (waitedS < withinS[0] || waitedS > withinS[1]) return null;
    place = next;
  }

  const from = commands[place]!.tick;
  const nextTick = commands[place + 1]?.tick ?? Infinity;
  const end = window.forS === undefined ? Infinity : from + Math.round(window.forS / sampleS);
  const span = within(facts, from, Math.min(nextTick, end));
  const leastRows = (window.atLeastS ?? 0) / sampleS;
  const isTooShort = span !== null && span.to - span.from < leastRows - 0.5;
  return isTooShort && !span.isCut ? null : span;
}

/** Place of the command that qualifies; `nth` counts from 0, or from the end when negative. */
function placeOf(ref: CommandRef, {commands, rows}: RunFacts): number | null {
  const qualified = commands.flatMap(({command, tick}, place) =>
    command === ref.command && rows.at(tick, 'lineMps') >= (ref.fromSpeedMps ?? 0) ? [place] : [],
  );
  return qualified[ref.nth < 0 ? qualified.length + ref.nth : ref.nth] ?? null;
}

function phaseSpan({phase, nth}: Window & {kind: 'phase'}, facts: RunFacts): FoundSpan | null {
  const wanted = PHASES.indexOf(phase);
  let seen = -1;
  let from: number | null = null;
  for (let row = 0; row <= facts.rows.count; row++) {
    const isIn = row < facts.rows.count && facts.rows.at(row, 'phase') === wanted;
    if (isIn && from === null) {
      from = row;
      seen++;
    } else if (!isIn && from !== null) {
      if (seen === nth) {
        return {from, to: row, isCut: facts.endedEarly && row === facts.rows.count};
      }
      from = null;
    }
  }
  return null;
}

function within({rows, endedEarly}: RunFacts, from: number, to: number): FoundSpan | null {
  const end = Math.round(to);
  const span = {
    from: Math.round(from),
    to: Math.min(rows.count, end),
    isCut: endedEarly && end > rows.count,
  };
  return span.from < span.to ? span : null;
}
