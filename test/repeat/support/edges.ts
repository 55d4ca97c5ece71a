import {
  AT_FIELD,
  DISTURB_FIELDS,
  type Field,
  FIELDS,
  LINE_FIELDS,
  type Scenario,
  SET_FIELDS,
} from '#sim-core/index';
import {Draws} from './draws';
import {copyOf, put, takeOut} from './paths';
import {FAMILIES} from './stands';
import {allowedValue} from './values';

/** A document with one thing about one key changed. */
export interface Edge {
  readonly what: string;
  readonly document: unknown;
}

/** Every key of a document, of its line commands and actions: missing, null, of a wrong type, at and beyond its ends. */
export function edges(): Edge[] {
  const {film, dancer} = STANDS;
  return [film, dancer].flatMap((stand) => [
    ...FIELDS.flatMap((field) => atKey(stand, field, field.path)),
    ...inItem(stand, 'line', {atS: 0.5, command: 'run', speedMps: 1, rampS: 1}, [
      AT_FIELD,
      ...LINE_FIELDS,
    ]),
    ...inItem(stand, 'line', {atS: 0.5, command: 'stop', rampS: 1}, [AT_FIELD, ...LINE_FIELDS]),
    ...inItem(stand, 'actions', {atS: 0.5, set: {kp: 0.1}}, [AT_FIELD]),
    ...inItem(stand, 'actions', {atS: 0.5, set: {kp: 0.1}}, SET_FIELDS, 'set'),
    ...inItem(stand, 'actions', {atS: 0.5, disturb: {ovalM: 0}}, DISTURB_FIELDS, 'disturb'),
  ]);
}

const standOf = (kind: string): Scenario =>
  FAMILIES.find(({sensing}) => sensing.kind === kind) ?? FAMILIES[0]!;
const STANDS = {film: standOf('loadCell'), dancer: standOf('dancer')};

function inItem(
  stand: Scenario,
  list: 'line' | 'actions',
  item: object,
  fields: readonly Field[],
  part?: string,
): Edge[] {
  const document = copyOf(stand);
  put(document, list, [item]);
  const place = [list, '0', ...(part === undefined ? [] : [part])].join('.');
  return fields.flatMap((field) => atKey(document, field, `${place}.${field.path}`));
}

function atKey(stand: object, field: Field, path: string): Edge[] {
  const without = copyOf(stand);
  takeOut(without, path);
  const values: Edge[] = valuesOf(field).map((value) => {
    const document = copyOf(stand);
    put(document, path, value);
    return {what: `${path} = ${shown(value)}`, document};
  });
  return [{what: `${path} missing`, document: without}, ...values];
}

/** Everything worth trying in a field. */
function valuesOf(field: Field): unknown[] {
  const draws = new Draws(1);
  const strange = [
    null,
    undefined,
    NaN,
    Infinity,
    -Infinity,
    '',
    '5',
    true,
    [],
    {},
    [[0, 0]],
    0,
    1,
  ];
  const {lowest, highest} = field;
  const values = [...strange, allowedValue(draws, field), ...(field.choices ?? [])];
  if (field.default !== null) values.push(field.default);
  if (field.pairs !== undefined) values.push(...curves(field, draws));
  if (lowest === null || highest === null) return values;
  if (field.kind === 'text') {
    const lengths = [lowest, lowest - 1, highest, highest + 1].filter((length) => length >= 0);
    return [...values, ...lengths.map((length) => 'x'.repeat(length))];
  }
  const ends = [
    lowest,
    next(lowest, -1),
    next(lowest, 1),
    highest,
    next(highest, 1),
    next(highest, -1),
  ];
  return [
    ...values,
    ...ends,
    lowest - 1,
    highest + 1,
    (lowest + highest) / 2,
    lowest + 0.5,
    `${lowest}`,
  ];
}

/** Curves with one point too few and too many, beyond each end, standing still, and with points that are none. */
function curves(field: Field, draws: Draws): unknown[] {
  const {x, y, fewest, most} = field.pairs!;
  const right = allowedValue(draws, field) as [number, number][];
  const even = (count: number): unknown =>
    Array.from({length: count}, (_, place) => [
      x.lowest + (place * (x.highest - x.lowest)) / Math.max(1, count - 1),
      y.lowest,
    ]);
  const withFirst = (point: unknown): unknown => [point, ...right.slice(1)];
  const withLast = (point: unknown): unknown => [...right.slice(0, -1), point];
  return [
    ...[fewest - 1, fewest, most, most + 1].map((count) => even(count)),
    ...[next(x.lowest, -1), x.lowest, next(x.lowest, 1)].map((first) =>
      withFirst([first, y.lowest]),
    ),
    ...[next(x.highest, -1), x.highest, next(x.highest, 1)].map((last) =>
      withLast([last, y.highest]),
    ),
    withFirst([x.lowest, next(y.lowest, -1)]),
    withLast([x.highest, next(y.highest, 1)]),
    withFirst([x.lowest]),
    withFirst([x.lowest, y.lowest, y.lowest]),
    withFirst([`${x.lowest}`, y.lowest]),
    withFirst({0: x.lowest, 1: y.lowest, length: 2}),
    withFirst(null),
    [...right, ...right],
    [...right].reverse(),
  ];
}

/** The number beside this one, above or below. */
function next(value: number, side: 1 | -1): number {
  if (value === 0) return side * Number.MIN_VALUE;
  const bits = new BigInt64Array(1);
  const number = new Float64Array(bits.buffer);
  number[0] = value;
  bits[0]! += BigInt(value > 0 ? side : -side);
  return number[0];
}

function shown(value: unknown): string {
  if (typeof value === 'string') return `'${value.slice(0, 20)}' (${value.length})`;
  if (typeof value === 'number' || value === undefined) return `${value}`;
  return JSON.stringify(value).slice(0, 60);
}
