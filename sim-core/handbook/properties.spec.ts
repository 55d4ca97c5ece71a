import {inertiaOf, stiffnessOf, woundOf} from '../test-support/balances';
import {aRandomScenario, DRAWN_S} from '../test-support/a-random-scenario';
import {integralOf} from '../test-support/curves';
import {record, type Recorded} from '../test-support/record';
import {startRun} from '../run/replay';
import {TraceBlock} from '../run/trace';
import {type Scenario} from '../scenario/scenario';

const SEEDS = Array.from({length: 8}, (_, i) => 105 + i);
/** Balances are summed over rows, so these runs have one each millisecond. */
const FINE = {controller: {sampleS: 0.001}};
const ROW_S = 0.001;

/** Energies of a run [J], from its rows. */
function energies(scenario: Scenario, {column}: Recorded) {
  const {roll, brake} = scenario;
  const [tensions, omegas, radii] = [column('tensionN'), column('rollRadps'), column('radiusM')];
  const heats = column('brakeC');
  const over = (value: (row: number) => number): number =>
    integralOf(
      tensions.map((_, row) => value(row)),
      ROW_S,
    );
  const last = tensions.length - 1;
  const turning = (row: number): number =>
    0.5 * inertiaOf(scenario, radii[row]!) * omegas[row]! ** 2;
  // web that leaves takes ½·m·v² along: mass from the roll's own inertia law, dJ = −R²·dm
  let carriedOff = 0;
  for (let row = 0; row < last; row++) {
    const lost = inertiaOf(scenario, radii[row]!) - inertiaOf(scenario, radii[row + 1]!);
    carriedOff += 0.5 * lost * omegas[row]! * omegas[row + 1]!;
  }
  return {
    kinetic: turning(last) - turning(0) + carriedOff,
    web: over((row) => tensions[row]! * radii[row]! * omegas[row]!),
    brake:
      brake.capacityJPerK * (heats[last]! - heats[0]!) +
      over((row) => brake.conductanceWPerK * (heats[row]! - 25)),
    bearings: over(
      (row) => roll.coulombNm! * Math.abs(omegas[row]!) + roll.viscousNmS! * omegas[row]! ** 2,
    ),
  };
}

// The laws below table M of the project's handbook, on documents drawn from fixed seeds.
describe('any sensible run', () => {
  for (const seed of SEEDS) {
    it(`${seed} keeps its energy: web work − brake heat − friction = kinetic gain (handbook M (a))`, () => {
      const scenario = aRandomScenario(seed, {dancers: false, uneven: false}, FINE);
      const recorded = record(scenario, DRAWN_S);
      const {kinetic, web, brake, bearings} = energies(scenario, recorded);

      expect(recorded.run.outcome.kind).toBe('running');
      expect(web).toBeGreaterThan(20);
      // tolerance: the sums over rows, not the engine
      expect(Math.abs(web - brake - bearings - kinetic) / web).toBeLessThan(1e-5);
    });

    it(`${seed} loses no web: unwound = delivered + more in the span (handbook M (b))`, () => {
      const scenario = aRandomScenario(
        seed,
        {dancers: false, uneven: false},
        {...FINE, web: {lossTimeS: 0}},
      );
      const {column} = record(scenario, DRAWN_S);
      const [tensions, slacks, lines, radii] = [
        column('tensionN'),
        column('slackM'),
        column('lineMps'),
        column('radiusM'),
      ];
      const last = tensions.length - 1;
      const strain = (row: number): number => tensions[row]! / stiffnessOf(scenario);
      const inSpan = (row: number): number =>
        scenario.span.lengthM / (1 + strain(row)) + slacks[row]!;
      const unwound = woundOf(scenario, radii[0]!) - woundOf(scenario, radii[last]!);
      const delivered = integralOf(
        lines.map((speed, row) => speed / (1 + strain(row))),
        ROW_S,
      );

      expect(delivered).toBeGreaterThan(1);
      expect(Math.abs(unwound - delivered - (inSpan(last) - inSpan(0)))).toBeLessThan(1e-6); // [m]
    });

    it(`${seed} never pushes its web nor turns its roll backwards (handbook M (c), (e))`, () => {
      const {column, run} = record(aRandomScenario(seed), DRAWN_S);

      expect(run.outcome.kind).toBe('running');
      expect(Math.min(...column('tensionN'))).toBeGreaterThanOrEqual(0);
      expect(Math.min(...column('rollRadps'))).toBeGreaterThanOrEqual(0);
    });

    it(`${seed} changes by less than 0.01 % of its peak with finer steps (handbook M (d): 0.5 %)`, () => {
      const coarse = record(aRandomScenario(seed), DRAWN_S);
      // half the plant step would change nothing where the engine divides it further by itself: a twentieth does
      const fine = record(aRandomScenario(seed, {}, {plantStepS: 0.00005}), DRAWN_S);
      const peak = Math.max(...coarse.column('tensionN'));
      const finer = fine.column('tensionN');
      const worst = coarse
        .column('tensionN')
        .reduce((most, tension, row) => Math.max(most, Math.abs(tension - finer[row]!)), 0);

      expect(worst).toBeGreaterThan(0);
      expect(worst / peak).toBeLessThan(1e-4);
    });

    it(`${seed} is the same run again, and another with another seed of its noise (handbook M (f))`, () => {
      const scenario = aRandomScenario(seed, {dancers: false}, {sensing: {noiseN: 1}});
      const traceOf = (document: Scenario): {hash: string; rows: Float64Array} => {
        const run = startRun(document);
        const block = new TraceBlock(1500);
        run.advance(1500, block);
        return {hash: run.hash(), rows: block.rows};
      };
      const first = traceOf(scenario);

      expect(traceOf(scenario)).toEqual(first);
      expect(traceOf({...scenario, seed: seed + 1}).hash).not.toBe(first.hash);
    });
  }

  it('is drawn with slack webs, limits, stops and rolls at rest among them', () => {
    const seen = new Set<string>();
    for (const seed of SEEDS) {
      const {run, column} = record(aRandomScenario(seed), DRAWN_S);
      for (const {kind} of run.events) seen.add(kind);
      if (column('rollRadps').slice(600).includes(0)) seen.add('rest');
    }

    expect([...seen]).toEqual(
      jasmine.arrayContaining(['slackBegan', 'outputLimitBegan', 'dancerStop', 'rest']),
    );
  });
});
