import {measuresOf, type Scenario, scenarioFaults, startRun, TraceBlock} from '#sim-core/index';
import {SET_UPS, setUpOf} from './library';
import {type SetUp} from './stand';

const SAMPLE_S = 0.01;
const STOP_S = 70;
const LENGTH_S = 100;

/** Figures of a job: a start to job speed, a minute of running, a stop; all on the true tension, against the job's. */
function jobOf(setUp: SetUp, scenario: Scenario) {
  const {speedMps, rampS, stopS} = setUp.job;
  const run = startRun({
    ...scenario,
    line: [
      {atS: 1, command: 'run', speedMps, rampS},
      {atS: STOP_S, command: 'stop', rampS: stopS},
    ],
  });
  const ticks = LENGTH_S / SAMPLE_S;
  const block = new TraceBlock(ticks);
  run.advance(ticks, block);
  const against = {
    sampleS: SAMPLE_S,
    targetN: setUp.scenario.controller.setPointN,
    lowestPct: 0,
    highestPct: 100,
  };
  const from = 1 / SAMPLE_S;
  const at = STOP_S / SAMPLE_S;
  return {
    kind: run.outcome.kind,
    running: measuresOf(block, {from, to: at}, against),
    late: measuresOf(block, {from: at - 2000, to: at}, against),
    stop: measuresOf(block, {from: at, to: ticks}, against),
  };
}

/** The first figure that is not as a job wants it, by name; null when all are. */
function failing(setUp: SetUp, scenario: Scenario): string | null {
  const {kind, running, late, stop} = jobOf(setUp, scenario);
  if (kind !== 'running') return kind;
  if (running.onTargetByS === null || running.onTargetByS > 30) return 'on target by';
  if ((late.inTolerancePct ?? 0) < 95) return 'time in tolerance';
  if ((running.peakPct ?? 0) > 150) return 'peak';
  if ((stop.loopM ?? 1) > 0) return 'loop at stop';
  return null;
}

/** The settings of one stand on another: what copying a neighbour's card does. */
function withCardOf(setUp: SetUp, other: SetUp): Scenario {
  return {...setUp.scenario, controller: other.scenario.controller};
}

describe('set-ups', () => {
  it('are ten and more, each with a key of its own and a word on where its values come from', () => {
    expect(SET_UPS.length).toBeGreaterThanOrEqual(10);
    expect(new Set(SET_UPS.map(({key}) => key)).size).toBe(SET_UPS.length);
    expect(SET_UPS.every(({source}) => /from memory|no source/.test(source))).toBeTrue();
    expect(setUpOf('none of them')).toBe(SET_UPS[0]!);
  });

  for (const setUp of SET_UPS) {
    it(`${setUp.title}: is a right document, at rest with its web held`, () => {
      const {scenario} = setUp;
      const run = startRun(scenario);
      run.advance(500);
      const view = run.view();

      expect(scenarioFaults(scenario)).toEqual([]);
      expect(view.rollRadps).toBeCloseTo(0, 3);
      expect(view.slackM).toBe(0);
      expect(view.tensionN).toBeGreaterThan(0.5 * scenario.initialTensionN);
    });

    it(`${setUp.title}: starts, settles within 5 % and stops without a loop`, () => {
      expect(failing(setUp, setUp.scenario)).toBeNull();
    });

    it(`${setUp.title}: fails a figure with the settings of any other stand`, () => {
      const passes = SET_UPS.filter(
        (other) => other !== setUp && failing(setUp, withCardOf(setUp, other)) === null,
      );

      expect(passes.map(({title}) => title)).toEqual([]);
    });
  }
});
