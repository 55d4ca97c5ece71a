import {type Field} from '#sim-core/index';
import {type Draws} from './draws';

/** Points of a curve. */
type Points = readonly (readonly [number, number])[];

/** Anything that a field allows: often an end of its range or near one, all sizes in between. */
export function allowedValue(draws: Draws, field: Field): unknown {
  switch (field.kind) {
    case 'boolean':
      return draws.chance(0.5);
    case 'choice':
      return draws.pick(field.choices!);
    case 'text':
      return text(draws, draws.pick([field.lowest!, draws.whole(field.lowest!, field.highest!)]));
    case 'whole':
      return draws.pick([
        field.lowest!,
        field.highest!,
        draws.whole(field.lowest!, field.highest!),
      ]);
    case 'number':
      return allowedNumber(draws, field.lowest!, field.highest!);
    case 'pairs':
      return points(draws, field);
  }
}

/** A value somebody would try: about `present` where there is one, else not far from the default. */
export function sensibleValue(draws: Draws, field: Field, present: unknown): unknown {
  if (field.kind !== 'number') return allowedValue(draws, field);
  const lowest = field.lowest!;
  const highest = field.highest!;
  const from = typeof present === 'number' ? present : (field.default ?? lowest);
  if (typeof from !== 'number') throw new TypeError(`${field.path} is no number`);
  const isMany = from !== 0 && from !== lowest;
  const to = isMany ? from * Math.pow(2, draws.between(-1, 1)) : from + little(draws, field, from);
  return Math.min(highest, Math.max(lowest, to));
}

/** What does not belong there: another type, just outside, no number at all. */
export function wrongValue(draws: Draws, {lowest, highest}: Field): unknown {
  if (lowest === null || highest === null || draws.chance(0.6)) return strangeValue(draws);
  return draws.pick([
    lowest - 1e-9 * Math.max(1, Math.abs(lowest)),
    highest + 1e-9 * Math.max(1, Math.abs(highest)),
    lowest - 1,
    highest * 2 + 1,
    lowest + 0.5,
    String(lowest),
    [lowest],
    {value: highest},
  ]);
}

/** A list within a list within a list. */
function nested(depth: number): unknown {
  return depth === 0 ? [] : [nested(depth - 1)];
}

/** Values that stand nowhere, or in the wrong place; made anew each time, as a document may be changed further. */
const STRANGE: readonly (() => unknown)[] = [
  ...[null, undefined, NaN, Infinity, -Infinity, -1, 0, -0, 1e308, 1e-300, 5e-324].map(
    (value) => () => value,
  ),
  ...['', '5', 'run', 'true', true, false, 10n, Symbol('5')].map((value) => () => value),
  () => [],
  () => ({}),
  () => [[0, 0]],
  () => [
    [0, 0],
    [100, '1'],
  ],
  () => [[0, 0, 0]],
  () => ({kind: 'dancer'}),
  () => ({length: 1, 0: 1}),
  () => nested(200),
  () => () => 5,
  () => new Date(0),
  () => new Map([['kp', 1]]),
  () => Object.create({kp: 1}) as unknown,
];

export function strangeValue(draws: Draws): unknown {
  return draws.pick(STRANGE)();
}

/** A part of the range, most often a very small one, to the side where there is room. */
function little(draws: Draws, {lowest, highest}: Field, from: number): number {
  const small = Math.pow(draws.share(), 6);
  const isUp = from < highest! && (from <= lowest! || draws.chance(0.5));
  return isUp ? small * (highest! - from) : small * (lowest! - from);
}

function allowedNumber(draws: Draws, lowest: number, highest: number): number {
  switch (draws.whole(0, 5)) {
    case 0:
      return lowest;
    case 1:
      return highest;
    case 2:
      return Math.min(highest, lowest + 1e-9 * Math.max(1, Math.abs(lowest)));
    case 3:
      return draws.between(lowest, highest);
    default: {
      // every size as often as any other
      const size = (highest - lowest) * Math.pow(10, -8 * draws.share());
      return Math.min(highest, lowest + size);
    }
  }
}

function points(draws: Draws, {pairs}: Field): Points {
  const {x, y, fewest, most, from, to} = pairs!;
  const count = draws.chance(0.05) ? most : draws.whole(fewest, Math.min(most, fewest + 4));
  const places = Array.from({length: count}, () => draws.between(x.lowest, x.highest));
  const rising = [...new Set(places)].sort((a, b) => a - b);
  if (from !== undefined) rising[0] = from;
  if (to !== undefined) rising[rising.length - 1] = to;
  return rising.map((place) => [
    place,
    draws.chance(0.2) ? draws.pick([y.lowest, y.highest]) : draws.between(y.lowest, y.highest),
  ]);
}

/** Letters of several scripts and what has to be escaped. */
function text(draws: Draws, length: number): string {
  const letters = ['a', 'Ö', '0', ' ', '"', '\\', '\n', '膜', '<'];
  return Array.from({length}, () => draws.pick(letters)).join('');
}
