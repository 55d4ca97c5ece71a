import {readdirSync, readFileSync} from 'node:fs';
import path from 'node:path';
import {replay} from '#sim-core/index';
import {BYTES, liveLog, LIVELY} from '../../tools/testing/pinned-runs';
import {type Browser, openChromium, openFirefox, serveProbe} from './support/browsers';
import {put, type Document} from './support/paths';
import {endOf, live, type Lived, type Plan, type Step} from './support/plans';
import {randomPlan, richPlan, shakenPlans} from './support/sessions';

const REFERENCE = path.resolve(import.meta.dirname, '../../sim-core/reference');
/** As many as hashes.spec.ts runs of each. */
const TICKS = 4000;
/** Sessions lived in every place, beside the reference cases. */
const SESSIONS = 40;
const SHAKEN = 30;
const PLACES = ['page', 'worker'] as const;
/** For a browser that starts on a machine that does other things too [ms]. */
const PATIENCE_MS = 180_000;

/** Documents of the reference cases by their letter. */
function referenceCases(): readonly (readonly [letter: string, document: Document])[] {
  return readdirSync(REFERENCE)
    .filter((name) => name.endsWith('.json'))
    .map((name) => [name[0]!, JSON.parse(readFileSync(path.join(REFERENCE, name), 'utf8'))]);
}

/** A load cell with noise of a hundredth of its range; a dancer has none. */
function noisy([letter, document]: readonly [string, Document]): Plan {
  const {sensing} = document as {sensing: {readonly kind: string; readonly rangeN: number}};
  if (sensing.kind === 'loadCell') put(document, 'sensing.noiseN', sensing.rangeN / 100);
  return {name: `${letter} with noise`, document, steps: [{ticks: TICKS}]};
}

/** The live log that is pinned, as a session: its acts at their ticks. */
function pinnedLog(): Plan {
  const {log, throughTick} = liveLog();
  let tick = 0;
  const steps = log.flatMap((entry): Step[] => {
    const wait = {ticks: entry.tick - tick};
    tick = entry.tick;
    if (entry.kind === 'set') return [wait, {act: {set: entry.set}}];
    if (entry.kind === 'line') return [wait, {act: {line: entry.line}}];
    return entry.kind === 'disturb' ? [wait, {act: {disturb: entry.disturb}}] : [wait];
  });
  return {name: 'live', document: LIVELY, steps: [...steps, {ticks: throughTick - tick}]};
}

describe('the engine', () => {
  const pinned: readonly Plan[] = [
    ...referenceCases().map(([name, document]) => ({name, document, steps: [{ticks: TICKS}]})),
    {name: 'noise', document: LIVELY, steps: [{ticks: TICKS}]},
    pinnedLog(),
  ];
  const plans: readonly Plan[] = [
    ...pinned,
    ...referenceCases().map(noisy),
    richPlan(1),
    richPlan(3),
    ...shakenPlans(SHAKEN),
    ...Array.from({length: SESSIONS}, (_, seed) => randomPlan(seed)),
  ];
  const json = JSON.stringify(plans);
  const here = plans.map(live);
  let closeServer: () => Promise<void>;
  let url: string;

  beforeAll(async () => {
    const server = await serveProbe();
    url = server.url;
    closeServer = server.close;
  });
  afterAll(() => closeServer());

  it('gives in Node the hashes that are pinned', () => {
    const hashes = here.slice(0, pinned.length).map(({name, hash}) => [name, hash]);

    expect(Object.fromEntries(hashes)).toEqual(BYTES.hashes);
  });

  it('is asked for enough: noise is felt, and the logs are rich', () => {
    const hashOf = (name: string): string => here.find((one) => one.name === name)!.hash;
    const cells = referenceCases().filter(
      ([, {sensing}]) => (sensing as {readonly kind: string}).kind === 'loadCell',
    );

    expect(cells.length).toBeGreaterThan(4);
    for (const [letter] of cells) expect(hashOf(`${letter} with noise`)).not.toBe(hashOf(letter));
    const rich = here.filter(({name}) => name.startsWith('every live key'));
    for (const {log} of rich) expect(log.length).toBeGreaterThan(50);
  });

  for (const [kind, open] of [
    ['Chromium', openChromium],
    ['Firefox', openFirefox],
  ] as const)
    describe(`in ${kind}`, () => {
      const there = new Map<string, readonly Lived[]>();
      let browser: Browser;
      beforeAll(async () => {
        browser = await open(url);
        for (const place of PLACES)
          there.set(place, JSON.parse(await browser.live(place, json)) as Lived[]);
      }, PATIENCE_MS);
      afterAll(() => browser.close(), PATIENCE_MS);

      for (const place of PLACES)
        it(`gives in a ${place} the bits that Node gives, rows and all`, () => {
          const lived = there.get(place)!;

          expect(lived.length).toBe(plans.length);
          const different = lived.filter(
            (one, index) => JSON.stringify(one) !== JSON.stringify(here[index]),
          );
          expect(different.map(({name, hash, rows}) => ({name, hash, rows})))
            .withContext(browser.name)
            .toEqual([]);
        });

      it('writes logs that Node replays to the same end', () => {
        there.get('worker')!.forEach(({name, log, throughTick, ...end}, index) => {
          const {hash, outcome, events, view} = end;
          const again = endOf(replay(plans[index]!.document, log, throughTick));
          expect(JSON.stringify(again))
            .withContext(`${name} of ${browser.name}`)
            .toBe(JSON.stringify({hash, outcome, events, view}));
        });
      });
    });
});
