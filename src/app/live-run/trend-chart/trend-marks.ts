import {type LogEntry, type RunEvent} from '#sim-core/index';
import {type UnitSystem} from '#shared/units';
import {entryWords, eventWords} from '#shared/wording/run';

/** An act or an event on the time axis. */
export interface Mark {
  readonly tick: number;
  readonly label: string;
  readonly isAlarm: boolean;
}

/** A numbered place on the tension trace: where marks were lost. */
export interface PlaceNumber {
  readonly tick: number;
  readonly number: number;
}

/** Marks of everything somebody did and everything that happened, in time's order. */
export function marksOf(
  entries: readonly LogEntry[],
  events: readonly RunEvent[],
  units: UnitSystem,
): Mark[] {
  const acts = entries.flatMap((entry) => {
    const label = entryWords(entry, units);
    return label === null ? [] : [{tick: entry.tick, label, isAlarm: false}];
  });
  const happened = events.flatMap((event) => {
    const label = eventWords(event, units);
    const isAlarm = event.kind === 'webBroke' || event.kind === 'slackBegan';
    return label === null ? [] : [{tick: event.atTick, label, isAlarm}];
  });
  return [...acts, ...happened].sort((a, b) => a.tick - b.tick);
}
