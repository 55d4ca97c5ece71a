import * as fc from 'fast-check';
import {scenarioFaults} from '#sim-core/index';
import {
  AT_FIELD,
  DISTURB_FIELDS,
  type Field,
  FIELDS,
  LINE_FIELDS,
  SET_FIELDS,
} from '#sim-core/scenario/fields';
import {aDancerScenario, aScenario} from '#sim-core/test-support/a-scenario';
import {Scenario} from './scenario';

const DOCUMENTS = 'document' in globalThis ? 2000 : 10_000;

/** Values that stand nowhere, or in the wrong place. */
const strange = fc.constantFrom<unknown[]>(
  null,
  undefined,
  NaN,
  Infinity,
  -1,
  0,
  -0,
  1e308,
  '',
  '5',
  'run',
  true,
  [],
  {},
  [[0, 0]],
  {kind: 'dancer'},
);

/** A number in its range, most often near the lower end, where rules between keys are. */
function between(lowest: number, highest: number): fc.Arbitrary<number> {
  return fc
    .double({min: 0, max: 1, noNaN: true})
    .map((share) => Math.min(highest, lowest + share ** 4 * (highest - lowest)));
}

function rightFor(field: Field): fc.Arbitrary<unknown> {
  const lowest = field.lowest ?? 0;
  const highest = field.highest ?? 0;
  switch (field.kind) {
    case 'boolean':
      return fc.boolean();
    case 'choice':
      return fc.constantFrom(...field.choices!);
    case 'text':
      return fc.string({minLength: lowest, maxLength: highest});
    case 'whole':
      return fc.integer({min: lowest, max: highest});
    case 'number':
      return fc.oneof(between(lowest, highest), fc.constantFrom(lowest, highest));
    case 'pairs':
      return pointsFor(field);
  }
}

/** Points with x rising; now and then an end is missing. */
function pointsFor({pairs}: Field): fc.Arbitrary<unknown> {
  const {x, y, from, to} = pairs!;
  const point = fc.tuple(between(x.lowest, x.highest), between(y.lowest, y.highest));
  const missing = fc.constantFrom('none', 'none', 'first', 'last');
  return fc.tuple(fc.array(point, {maxLength: 4}), missing).map(([points, end]) => {
    const sorted = points.toSorted(([a], [b]) => a - b);
    if (from !== undefined && end !== 'first') sorted.unshift([from, 0]);
    if (to !== undefined && end !== 'last') sorted.push([to, 1]);
    return sorted;
  });
}

/** Just outside the range, and what only looks like a value of it. */
function wrongFor({lowest, highest}: Field): fc.Arbitrary<unknown> {
  if (lowest === null || highest === null) return strange;
  return fc.constantFrom<unknown[]>(lowest - 1e-9, highest + 1, lowest + 0.5, '', 'x');
}

function valueFor(field: Field): fc.Arbitrary<unknown> {
  return fc.oneof(
    {weight: 12, arbitrary: rightFor(field)},
    {weight: 1, arbitrary: wrongFor(field)},
    {weight: 1, arbitrary: strange},
  );
}

/** An object with some of the keys of a table. */
function someOf(fields: readonly Field[]): fc.Arbitrary<object> {
  return fc
    .subarray([...fields], {maxLength: 3})
    .chain((chosen) =>
      fc.tuple(...chosen.map((field) => fc.tuple(fc.constant(field.path), valueFor(field)))),
    )
    .map((entries) => Object.fromEntries(entries));
}

/** Keys that rules between keys look at: changed more often than the others. */
const RULED =
  /sampleS|plantStepS|radius|Radius|outM|tracking|antiWindup|inputFilter|lagS|filterS|TorqueNm/;
const isRuled = ({path}: Field): boolean => RULED.test(path);
const RULED_SET = SET_FIELDS.filter(isRuled);

const lineItem = fc
  .tuple(valueFor(AT_FIELD), someOf(LINE_FIELDS), fc.boolean())
  .map(([atS, some, isWhole]) =>
    isWhole
      ? {atS, command: 'stop', rampS: 3}
      : {atS, command: 'run', speedMps: 2, rampS: 2, ...some},
  );
/** Around two ticks, so that actions act in another order than they stand in. */
const actionS = fc.constantFrom(0, 0.995, 1, 1 + 5e-10, 1 + 2e-9, 1.01, 2);
const action = fc.oneof(
  fc.tuple(actionS, someOf(SET_FIELDS)).map(([atS, set]) => ({atS, set})),
  fc.tuple(actionS, someOf(RULED_SET)).map(([atS, set]) => ({atS, set})),
  fc.tuple(actionS, someOf(DISTURB_FIELDS)).map(([atS, disturb]) => ({atS, disturb})),
  fc.record(
    {atS: valueFor(AT_FIELD), set: someOf(SET_FIELDS), disturb: someOf(DISTURB_FIELDS)},
    {requiredKeys: []},
  ),
);

/** Sets of the two limits of the output, which agree or not by the order they act in. */
const limitSet = fc
  .tuple(actionS, fc.constantFrom('outMinPct', 'outMaxPct'), fc.constantFrom(10, 20, 30, 40))
  .map(([atS, key, percent]) => ({atS, set: {[key]: percent}}));

/** Puts a value at a path, or takes the key out. */
interface Edit {
  readonly path: string;
  readonly takesOut: boolean;
  readonly value: unknown;
}

function editOf(path: string, value: fc.Arbitrary<unknown>): fc.Arbitrary<Edit> {
  const takesOut = fc.nat({max: 29}).map((drawn) => drawn === 0);
  return fc.record({path: fc.constant(path), takesOut, value});
}

/** Kinds of which the table has few, so that they come up often enough. */
const RARE = FIELDS.filter(({kind}) => kind === 'whole' || kind === 'text' || kind === 'pairs');
const fieldEdit = fc.oneof(
  ...[FIELDS, FIELDS.filter(isRuled)].map((fields) =>
    fc.constantFrom(...fields).chain((field) => editOf(field.path, valueFor(field))),
  ),
  fc
    .constantFrom(...RARE)
    .chain((field) => editOf(field.path, fc.oneof(rightFor(field), wrongFor(field)))),
);
const edit = fc.oneof(
  {weight: 12, arbitrary: fieldEdit},
  {weight: 3, arbitrary: editOf('line', fc.array(lineItem, {maxLength: 3}))},
  {weight: 5, arbitrary: editOf('actions', fc.array(action, {maxLength: 3}))},
  {weight: 2, arbitrary: editOf('actions', fc.array(limitSet, {maxLength: 4}))},
  // as much as the plain stand's maxTorqueNm
  {weight: 1, arbitrary: editOf('brake.residualTorqueNm', fc.constant(90))},
  {
    weight: 1,
    arbitrary: fc
      .constantFrom('web', 'sensing', 'format', 'colour', 'web.colour', '__proto__')
      .chain((path) => editOf(path, strange)),
  },
);

function withEdits(base: object, edits: readonly Edit[]): unknown {
  const document = JSON.parse(JSON.stringify(base)) as Record<string, unknown>;
  for (const {path, takesOut, value} of edits) {
    const keys = path.split('.');
    const last = keys.pop()!;
    const into = keys.reduce<unknown>((at, key) => (at as Record<string, unknown>)[key], document);
    if (typeof into !== 'object' || into === null) continue; // an earlier edit took the section
    if (takesOut) Reflect.deleteProperty(into, last);
    else
      Object.defineProperty(into, last, {
        value,
        enumerable: true,
        configurable: true,
        writable: true,
      });
  }
  return document;
}

const anyDocument = fc
  .tuple(fc.constantFrom(aScenario(), aDancerScenario()), fc.array(edit, {maxLength: 3}))
  .map(([base, edits]) => withEdits(base, edits));

/** Whether the engine takes a document, but for how stiff its plant is. */
function engineTakes(document: unknown): boolean {
  return scenarioFaults(document).every(({allowed}) => allowed.startsWith('a plant slower than'));
}

function schemaTakes(document: unknown): boolean {
  return Scenario.safeParse(document).success;
}

describe('Scenario', () => {
  it('accepts the plain stands, with every optional key left out', () => {
    expect(schemaTakes(aScenario())).toBeTrue();
    expect(schemaTakes(aDancerScenario())).toBeTrue();
  });

  it('gives back what it was given', () => {
    const document = aScenario({actions: [{atS: 1, set: {startOutputPct: null, kp: 0.2}}]});

    expect(Scenario.parse(document)).toEqual(document);
  });

  it('names the place of what it refuses', () => {
    const wrong = {...aScenario({web: {widthM: -1}, roll: {radiusM: 0.01}}), colour: 'red'};

    const paths = Scenario.safeParse(wrong).error!.issues.map(({path}) => path.join('.'));

    expect(paths).toEqual(['web.widthM', '']);
    const small = Scenario.safeParse(aScenario({roll: {radiusM: 0.01}}));
    expect(small.error!.issues.map(({path}) => path.join('.'))).toEqual(['roll.radiusM']);
  });

  it('leaves it to the engine to find a plant too stiff to be stepped', () => {
    const stiff = aScenario({web: {lossTimeS: 1, modulusPa: 3.5e10}});

    expect(schemaTakes(stiff)).toBeTrue();
    expect(scenarioFaults(stiff).map(({path}) => path)).toEqual(['plantStepS']);
  });

  it(`accepts and refuses what the engine does, in ${DOCUMENTS} documents`, () => {
    let accepted = 0;
    fc.assert(
      fc.property(anyDocument, (document) => {
        const takes = schemaTakes(document);
        if (takes) accepted++;
        return takes === engineTakes(document);
      }),
      {numRuns: DOCUMENTS, seed: 20_261_201},
    );

    // or it would not say much
    expect(accepted).toBeGreaterThan(0.2 * DOCUMENTS);
    expect(accepted).toBeLessThan(0.8 * DOCUMENTS);
  });
});
