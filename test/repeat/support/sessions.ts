import {
  type Act,
  DISTURB_FIELDS,
  type Field,
  type LineCommand,
  type Scenario,
  SET_FIELDS,
  settingsOf,
} from '#sim-core/index';
import {Draws} from './draws';
import {at, copyOf, type Document, put} from './paths';
import {type Plan, type Step} from './plans';
import {NONWOVEN, randomStand} from './stands';
import {sensibleValue} from './values';

/** Shortest and longest session [s], and most ticks run in one call: a page that was hidden for a while. */
const SHORTEST_S = 3;
const LONGEST_S = 20;
const MOST_AT_ONCE = 333;

/** A session that somebody could have had on the free bench: a stand, and what was done to it. */
export function randomPlan(seed: number): Plan {
  const draws = new Draws(seed);
  const document = randomStand(draws);
  const {sampleS} = settingsOf(document.controller);
  const lengthS = SHORTEST_S + draws.share() * draws.share() * (LONGEST_S - SHORTEST_S);
  let left = Math.round(lengthS / sampleS);
  const steps: Step[] = [];
  if (draws.chance(0.7)) steps.push({act: {line: runOf(draws)}});
  while (left > 0) {
    const ticks = Math.min(left, draws.whole(1, MOST_AT_ONCE));
    steps.push({ticks});
    left -= ticks;
    for (let count = draws.pick([0, 0, 1, 1, 2, 3]); count > 0; count--)
      steps.push(randomStep(draws, document));
  }
  return {name: `session ${seed}`, document, steps};
}

/** A session in which every key that can be changed live is changed once or twice, and every note written. */
export function richPlan(seed: number): Plan {
  const draws = new Draws(seed);
  const document = randomStand(draws);
  const steps: Step[] = [{act: {line: runOf(draws)}}, {ticks: draws.whole(1, MOST_AT_ONCE)}];
  const acts = [
    ...SET_FIELDS.map((field) => setOf(draws, document, [field])),
    ...belonging(document).map((field) => disturbOf(draws, document, [field])),
    ...Array.from({length: 8}, () => ({line: commandOf(draws)})),
  ];
  for (const act of acts.flatMap((each) => (draws.chance(0.3) ? [each, each] : [each])))
    steps.push({act}, {ticks: draws.whole(1, 60)});
  for (const note of NOTES) steps.push({note}, {ticks: draws.whole(1, 20)});
  return {name: `every live key, ${seed}`, document, steps};
}

/**
 * Short runs in which a last bit of a sine, an exponential or a logarithm shows: all that turns is far out of round
 * and a soft web keeps together, each with a lag of its own and a noisy cell.
 */
export function shakenPlans(count: number): Plan[] {
  const draws = new Draws(count);
  return Array.from({length: count}, (_, place): Plan => {
    const document = copyOf(NONWOVEN);
    put(document, 'seed', place);
    put(document, 'roll.eccentricityM', draws.between(0.005, 0.03));
    put(document, 'roll.ovalM', draws.between(0.001, 0.01));
    put(document, 'span.rollerRunoutM', draws.between(0.005, 0.02));
    put(document, 'brake.lagS', 0.002 * Math.pow(1.2, place));
    put(document, 'sensing.noiseN', 10);
    const disturb = {rippleMps: draws.between(0.1, 1), rippleHz: draws.between(1, 20)};
    const steps = [{act: {disturb}}, {act: {line: runOf(draws)}}, {ticks: 600}];
    return {name: `shaken ${place}`, document, steps};
  });
}

const NOTES: readonly Extract<Step, {note: unknown}>['note'][] = [
  {kind: 'pause'},
  {kind: 'resume'},
  {kind: 'factor', factor: 4},
  {kind: 'hint', hint: 0},
  {kind: 'answer', question: 1, answer: 'Bahnzug zu „hoch“ – 5 % \\ "'},
  {kind: 'answer', question: 2, answer: 0.1 + 0.2},
  {kind: 'namedFault', fault: 'stick', place: {fromTick: 10, toTick: 200, trace: 'output'}},
];

function randomStep(draws: Draws, document: Scenario): Step {
  const kind = draws.whole(0, 9);
  if (kind === 0) return {note: draws.pick(NOTES)};
  return {act: randomAct(draws, document, kind)};
}

function randomAct(draws: Draws, document: Scenario, kind: number): Act {
  if (kind <= 3) return {line: commandOf(draws)};
  if (kind <= 5) return disturbOf(draws, document, some(draws, belonging(document)));
  return setOf(draws, document, some(draws, SET_FIELDS));
}

function some(draws: Draws, fields: readonly Field[]): Field[] {
  return Array.from({length: draws.pick([1, 1, 1, 2, 3])}, () => draws.pick(fields));
}

function commandOf(draws: Draws): LineCommand {
  if (draws.chance(0.6)) return runOf(draws);
  const command = draws.pick(['stop', 'fastStop'] as const);
  return {command, rampS: draws.pick([0, draws.between(0, 1), draws.between(1, 5)])};
}

function runOf(draws: Draws): LineCommand {
  const rampS = draws.chance(0.05) ? 0 : draws.between(0.5, 6);
  return {command: 'run', speedMps: draws.chance(0.03) ? 0 : draws.between(0.2, 6), rampS};
}

function setOf(draws: Draws, document: Scenario, fields: readonly Field[]): Act {
  const {controller} = document as unknown as {readonly controller: Document};
  return {set: valuesOf(draws, fields, (key) => controller[key])};
}

function disturbOf(draws: Draws, document: Scenario, fields: readonly Field[]): Act {
  const plant = ['web', 'roll', 'sensing'];
  const present = (key: string): unknown =>
    plant
      .map((section) => at(document as unknown as Document, `${section}.${key}`))
      .find((value) => value !== undefined) ?? PRESENT[key];
  return {disturb: valuesOf(draws, fields, present)};
}

/** Where a disturbance begins that has no key of its own in the document. */
const PRESENT: Readonly<Record<string, number>> = {supply: 1, spanPct: 100, zeroN: 0};

function valuesOf(
  draws: Draws,
  fields: readonly Field[],
  present: (key: string) => unknown,
): Document {
  return Object.fromEntries(
    fields.map((field) => [
      field.path,
      field.offByNull && draws.chance(0.3)
        ? null
        : sensibleValue(draws, field, present(field.path)),
    ]),
  );
}

/** Disturbances that this kind of sensing can have. */
function belonging({sensing}: Scenario): Field[] {
  return DISTURB_FIELDS.filter(({onlyWith = sensing.kind}) => onlyWith === sensing.kind);
}
