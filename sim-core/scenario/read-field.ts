import {type Fault} from './faults';
import {type Bounds, type Field, isPlainText, type PairBounds} from './fields';

/** A JSON object. */
export type JsonObject = Readonly<Record<string, unknown>>;

export function isObject(value: unknown): value is JsonObject {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** What may stand in a field, for people: `0.001 … 20 m`. */
export function allowedIn(field: Field): string {
  const off = field.offByNull ? ', or null' : '';
  switch (field.kind) {
    case 'boolean':
      return 'true or false';
    case 'choice':
      return (field.choices ?? []).join(', ');
    case 'text':
      return `a text of ${field.lowest ?? 0} … ${field.highest ?? 0} characters`;
    case 'pairs':
      return `${describePairs(field.pairs!)}${off}`;
    case 'whole':
      return `a whole number ${range(field)}`;
    case 'number':
      return `${range(field)}${off}`;
  }
}

function range({lowest, highest, unit}: Field): string {
  return `${lowest ?? ''} … ${highest ?? ''}${unit === '' ? '' : ` ${unit}`}`;
}

function describePairs({x, y, xUnit, yUnit, fewest, most, from, to}: PairBounds): string {
  const span =
    from === undefined || to === undefined
      ? `from ${x.lowest} … ${x.highest} ${xUnit}`
      : `from ${from} to ${to} ${xUnit}`;
  return `${fewest} … ${most} points [x, y], x rising ${span}, y ${y.lowest} … ${y.highest} ${yUnit}`.trim();
}

/** Whether `value` may stand in `field`. Null is judged by the caller: it is an act's word, not a value. */
export function fits(field: Field, value: unknown): boolean {
  switch (field.kind) {
    case 'boolean':
      return typeof value === 'boolean';
    case 'choice':
      return field.choices?.some((one) => one === value) ?? false;
    case 'text':
      return typeof value === 'string' && within(value.length, bounds(field)) && isPlainText(value);
    case 'whole':
      return typeof value === 'number' && value % 1 === 0 && within(value, bounds(field));
    case 'number':
      return typeof value === 'number' && within(value, bounds(field));
    case 'pairs':
      return Array.isArray(value) && pairsFit(field.pairs!, value);
  }
}

function bounds({lowest, highest}: Field): Bounds {
  return {lowest: lowest ?? 0, highest: highest ?? 0};
}

/** False for NaN as well. */
function within(value: number, {lowest, highest}: Bounds): boolean {
  return value >= lowest && value <= highest;
}

function pairsFit(allowed: PairBounds, points: readonly unknown[]): boolean {
  if (points.length < allowed.fewest || points.length > allowed.most) return false;
  let last = -1 / 0;
  for (const point of points) {
    if (!Array.isArray(point) || point.length !== 2) return false;
    const [x, y] = point as readonly unknown[];
    if (typeof x !== 'number' || typeof y !== 'number') return false;
    if (!within(x, allowed.x) || !within(y, allowed.y) || !(x > last)) return false;
    if (last === -1 / 0 && allowed.from !== undefined && x !== allowed.from) return false;
    last = x;
  }
  return allowed.to === undefined || last === allowed.to;
}

/** Fields by the last part of their path, made once for each table of keys. */
export type FieldTable = ReadonlyMap<string, Field>;

export function tableOf(fields: readonly Field[]): FieldTable {
  return new Map(fields.map((field) => [keyOf(field), field]));
}

/** Checks the keys of one object: unknown, missing and wrong ones, each as a fault below `at`. */
export function readKeys(
  at: string,
  json: JsonObject,
  byKey: FieldTable,
  rules: {readonly nullTakesOff: boolean; readonly alsoKnown?: readonly string[]},
): Fault[] {
  const faults: Fault[] = [];
  for (const [key, value] of Object.entries(json)) {
    const field = byKey.get(key);
    if (field === undefined) {
      if (rules.alsoKnown?.includes(key) !== true)
        faults.push({path: join(at, key), value, allowed: `no such key`});
    } else if (value === null && field.offByNull && rules.nullTakesOff) {
      continue;
    } else if (!fits(field, value)) {
      faults.push({path: join(at, key), value, allowed: allowedIn(field)});
    }
  }
  for (const [key, field] of byKey)
    if (field.required && json[key] === undefined && !Object.hasOwn(json, key))
      faults.push({path: join(at, key), value: undefined, allowed: allowedIn(field)});
  return faults;
}

/** The last part of a field's path. */
export function keyOf({path}: Field): string {
  return path.slice(path.lastIndexOf('.') + 1);
}

export function join(at: string, key: string): string {
  return at === '' ? key : `${at}.${key}`;
}
