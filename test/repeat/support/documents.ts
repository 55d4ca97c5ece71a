import {
  AT_FIELD,
  DISTURB_FIELDS,
  type Field,
  FIELDS,
  LINE_FIELDS,
  MOST_ENTRIES,
  SET_FIELDS,
} from '#sim-core/index';
import {Draws} from './draws';
import {at, copyOf, type Document, isDocument, put, takeOut} from './paths';
import {FAMILIES, randomStand} from './stands';
import {allowedValue, sensibleValue, strangeValue, wrongValue} from './values';

/** Sections of a document, and what else stands at its top. */
const SECTIONS = [
  ...new Set(FIELDS.filter(({path}) => path.includes('.')).map(({path}) => path.split('.')[0]!)),
];
const LISTS = ['line', 'actions'];
const UNKNOWN = ['colour', '__proto__', 'constructor', 'toString', '', 'atS', 'kp', 'set'];
/** Keys by which a step can be made so short that two seconds of it take long: seldom changed. */
const COSTLY = ['plantStepS', 'controller.sampleS'];

/** A document changed at random; most often it may be taken still, now and then nothing is right in it. */
export function randomDocument(seed: number): unknown {
  const draws = new Draws(seed);
  const document = copyOf(draws.chance(0.5) ? randomStand(draws) : draws.pick(FAMILIES));
  put(document, 'seed', draws.whole(0, 4294967295));
  if (draws.chance(0.6)) put(document, 'line', lineOf(draws, allowedValue));
  if (draws.chance(0.6)) put(document, 'actions', actionsOf(draws, sensible, document));
  if (draws.chance(0.06)) stretchAll(draws, document);
  for (let count = draws.pick([0, 1, 1, 2, 3, 5]); count > 0; count--) stretch(draws, document);
  if (draws.chance(0.75)) return document;
  for (let count = draws.pick([1, 1, 1, 2, 4]); count > 0; count--) spoil(draws, document);
  return draws.chance(0.03) ? strangeValue(draws) : document;
}

type Value = (draws: Draws, field: Field) => unknown;
const sensible: Value = (draws, field) => sensibleValue(draws, field, undefined);

/** Puts anything that is allowed into one key. */
function stretch(draws: Draws, document: Document): void {
  const field = draws.pick(FIELDS.filter((each) => belongs(each, document)));
  if (COSTLY.includes(field.path) && draws.chance(0.8)) return;
  put(document, field.path, allowedValue(draws, field));
}

/** Puts anything that is allowed into every third key. */
function stretchAll(draws: Draws, document: Document): void {
  for (const field of FIELDS)
    if (belongs(field, document) && !COSTLY.includes(field.path) && draws.chance(0.3))
      put(document, field.path, allowedValue(draws, field));
}

/** One thing wrong, or what looks wrong. */
function spoil(draws: Draws, document: Document): void {
  const field = draws.pick(FIELDS);
  const section = draws.pick(['', ...SECTIONS.map((name) => `${name}.`)]);
  const key = draws.pick([...FIELDS.map(({path}) => path), ...SECTIONS, ...LISTS]);
  const whole = draws.pick([...SECTIONS, ...LISTS, 'format']);
  const ways = [
    () => put(document, field.path, wrongValue(draws, field)),
    () => put(document, field.path, wrongValue(draws, field)),
    () => takeOut(document, key),
    () => put(document, section + draws.pick(UNKNOWN), strangeValue(draws)),
    () => put(document, whole, strangeValue(draws)),
    () => put(document, 'line', lineOf(draws, oftenWrong)),
    () => put(document, 'actions', actionsOf(draws, oftenWrong, document)),
    () => spoilItem(draws, document),
  ];
  draws.pick(ways)();
}

const oftenWrong: Value = (draws, field) =>
  draws.chance(0.2) ? wrongValue(draws, field) : allowedValue(draws, field);

/** Something wrong about an item of a list, or far too many of them. */
function spoilItem(draws: Draws, document: Document): void {
  const list = at(document, draws.pick(LISTS));
  if (!Array.isArray(list)) return;
  const item: unknown = draws.pick([...(list as unknown[]), null]);
  const isObject = isDocument(item) && !Array.isArray(item);
  switch (draws.whole(0, 3)) {
    case 0:
      list.push(strangeValue(draws));
      break;
    case 1:
      if (isObject) put(item, draws.pick(UNKNOWN), strangeValue(draws));
      break;
    case 2:
      if (isObject) takeOut(item, draws.pick([...Object.keys(item), 'atS']));
      break;
    default:
      if (draws.chance(0.02)) list.push(...Array<unknown>(MOST_ENTRIES + 1).fill(item));
  }
}

/** Line commands in the first seconds, in any order. */
function lineOf(draws: Draws, value: Value): Document[] {
  return Array.from({length: draws.whole(0, 4)}, () => {
    const command = draws.pick(['run', 'run', 'stop', 'fastStop']);
    const fields = LINE_FIELDS.filter(
      ({path, onlyCommand}) => path !== 'command' && onlyCommand?.includes(command) !== false,
    );
    const values = fields.map((field): readonly [string, unknown] => [
      field.path,
      draws.chance(0.8) ? draws.between(0.05, 8) : value(draws, field),
    ]);
    return {atS: timeOf(draws, value), command, ...Object.fromEntries(values)};
  });
}

/** Actions in the first seconds, in any order; some hardly apart. */
function actionsOf(draws: Draws, value: Value, document: Document): Document[] {
  return Array.from({length: draws.whole(0, 4)}, () => {
    const isSet = draws.chance(0.6);
    const fields = isSet
      ? SET_FIELDS
      : DISTURB_FIELDS.filter((field) => belongs(field, document) || draws.chance(0.01));
    const chosen = Array.from({length: draws.whole(1, 3)}, () => draws.pick(fields));
    const values = chosen.map((field): readonly [string, unknown] => [
      field.path,
      field.offByNull && draws.chance(0.2) ? null : value(draws, field),
    ]);
    return {atS: timeOf(draws, value), [isSet ? 'set' : 'disturb']: Object.fromEntries(values)};
  });
}

function timeOf(draws: Draws, value: Value): unknown {
  if (draws.chance(0.05)) return value(draws, AT_FIELD);
  return draws.pick([0, 0.5, 1, 1 + 5e-10, 1 + 2e-9, 1.01, draws.between(0, 2)]);
}

/** Whether a key is one of this document's kind of sensing. */
function belongs({onlyWith}: Field, document: Document): boolean {
  return onlyWith === undefined || at(document, 'sensing.kind') === onlyWith;
}
