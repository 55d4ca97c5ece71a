import {isDeepStrictEqual} from 'node:util';
import {replay} from '#sim-core/index';
import {Draws} from './support/draws';
import {endOf, live, type Lived} from './support/plans';
import {randomPlan} from './support/sessions';
import {type Sent, throughTheWire} from './support/wire';

const SESSIONS = 1000;
/** Time for all of it on a machine that does other things too [ms]. */
const PATIENCE_MS = 300_000;

describe(`${SESSIONS} random live sessions`, () => {
  let lived: readonly Lived[];
  let stored: readonly Sent[];

  beforeAll(async () => {
    const plans = Array.from({length: SESSIONS}, (_, seed) => randomPlan(seed));
    lived = plans.map(live);
    const sent = lived.map(({log, throughTick}, place) => ({
      document: plans[place]!.document,
      log,
      throughTick,
    }));
    stored = await throughTheWire(sent, new Draws(SESSIONS));
  }, PATIENCE_MS);

  it('replayed in one go from a stored log, give hash, outcome, events and view that were lived', () => {
    const other = lived.filter(({hash, outcome, events, view}, place) => {
      const {document, log, throughTick} = stored[place]!;
      const again = endOf(replay(document, log, throughTick));
      return !isDeepStrictEqual(again, {hash, outcome, events, view});
    });

    expect(other.map(({name}) => name)).toEqual([]);
  });

  it('are rich enough to say something', () => {
    const acts = lived.flatMap(({log}) => log.map(({kind}) => kind));
    const most = (kind: string): number => acts.filter((each) => each === kind).length;
    const ran = lived.filter(({outcome}) => outcome.kind === 'running').length;

    for (const kind of ['set', 'line', 'disturb']) expect(most(kind)).toBeGreaterThan(SESSIONS);
    expect(ran)
      .withContext('still running at the end')
      .toBeGreaterThan(0.7 * SESSIONS);
    expect(lived.filter(({outcome}) => outcome.kind === 'diverged')).toEqual([]);
    expect(new Set(lived.map(({hash}) => hash)).size).toBe(SESSIONS);
  });
});
