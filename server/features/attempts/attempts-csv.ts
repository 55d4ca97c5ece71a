import {type SummaryReply} from './attempt-mapper';

const HEADINGS = [
  'exercise number',
  'exercise',
  'person',
  'state',
  'started',
  'handed in',
  'score',
  'passed',
];

/** Attempts as a table for other programs (RFC 4180); numbers with a point, times in UTC. */
export function attemptsCsv(attempts: readonly SummaryReply[]): string {
  const rows = attempts.map(({exercise, person, state, startedAt, handedInAt, score, passed}) => [
    exercise.number,
    exercise.title,
    person.name,
    state,
    startedAt,
    handedInAt,
    score,
    passed === null ? null : passed ? 'yes' : 'no',
  ]);
  return [HEADINGS, ...rows].map((cells) => `${cells.map(csvCell).join(',')}\r\n`).join('');
}

/** A text that a spreadsheet would take for a formula gets an apostrophe before it. */
export function csvCell(value: string | number | null): string {
  if (value === null) return '';
  if (typeof value === 'number') return `${value}`;
  const text = /^[=+\-@\t]/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
