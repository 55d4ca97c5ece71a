import * as a from '../reference/a-smooth-running.rows';
import * as b from '../reference/b-start-step-stop.rows';
import * as c from '../reference/c-out-of-round.rows';
import * as d from '../reference/d-dancer-speed-change.rows';
import * as e from '../reference/e-near-core-hot.rows';
import * as f from '../reference/f-web-break.rows';
import * as g from '../reference/g-rounded-ramps.rows';
import {readScenario} from '../scenario/read-scenario';
import {type Scenario} from '../scenario/scenario';
import {LIVELY} from '../test-support/a-live-log';
import {aDancerScenario, aScenario, type Parts} from '../test-support/a-scenario';
import {Simulation} from './simulation';
import {TraceBlock, type TraceColumn} from './trace';

/** Rows of a run with the hot loop and of the same run without it. */
function bothWays(document: unknown, lengthS: number): readonly [TraceBlock, TraceBlock] {
  const scenario = readScenario(document);
  const ticks = Math.round(lengthS / (scenario.controller.sampleS ?? 0.01));
  const [hot, careful] = [false, true].map((isCareful) => {
    const block = new TraceBlock(ticks);
    new Simulation(scenario, isCareful).advance(ticks, block);
    return block;
  });
  return [hot!, careful!];
}

/** Greatest difference of a column between two blocks. */
function apart([hot, careful]: readonly [TraceBlock, TraceBlock], column: TraceColumn): number {
  let most = 0;
  for (let row = 0; row < careful.count; row++)
    most = Math.max(most, Math.abs(hot.at(row, column) - careful.at(row, column)));
  return most;
}

/** Share of a run's ticks that took the hot loop's way. */
function quietShare(document: unknown, ticks: number): number {
  const run = new Simulation(readScenario(document));
  const careful = spyOn(run as unknown as {runTick: () => void}, 'runTick').and.callThrough();
  run.advance(ticks);
  return 1 - careful.calls.count() / ticks;
}

/**
 * The plain equations of `plant/` and the controller of `control/`, tick by tick, are the oracle of the hot loop.
 * Neither takes a number from the other but through the run's state.
 */
describe('quiet ticks', () => {
  const cases: Readonly<Record<string, Scenario>> = {
    'reference a': a.DOCUMENT as Scenario,
    'reference b': b.DOCUMENT as Scenario,
    'reference c': c.DOCUMENT as Scenario,
    'reference d': d.DOCUMENT as Scenario,
    'reference e': e.DOCUMENT as Scenario,
    'reference g': g.DOCUMENT as Scenario,
    'noise, derivative, filter': LIVELY,
    ...variants(),
  };
  for (const [name, scenario] of Object.entries(cases))
    it(`give what careful ticks give: ${name}`, () => {
      const rows = bothWays(scenario, Math.min(40, scenario.durationS));
      const {sensing} = scenario;
      const rangeN =
        sensing.kind === 'loadCell' ? sensing.rangeN : 2 * scenario.controller.setPointN;

      expect(rows[0].count).toBe(rows[1].count);
      expect(apart(rows, 'tensionN') / rangeN).toBeLessThan(5e-5);
      expect(apart(rows, 'measuredN') / rangeN).toBeLessThan(5e-5);
      expect(apart(rows, 'outputPct')).toBeLessThan(5e-3);
      expect(apart(rows, 'setPointN')).toBe(0);
      expect(apart(rows, 'phase')).toBe(0);
      expect(apart(rows, 'lineMps')).toBe(0);
      expect(apart(rows, 'dancerM')).toBeLessThan(1e-5);
      expect(apart(rows, 'rollRadps')).toBeLessThan(1e-4);
      expect(apart(rows, 'radiusM')).toBeLessThan(1e-9);
      expect(apart(rows, 'torqueNm')).toBeLessThan(5e-3);
      expect(apart(rows, 'brakeC')).toBeLessThan(1e-3);
    });

  it('break the web at the same moment as careful ticks do', () => {
    const ends = [false, true].map((isCareful) => {
      const run = new Simulation(readScenario(f.DOCUMENT), isCareful);
      run.advance(2000);
      return run.outcome;
    });

    expect(ends[0]!.kind).toBe('webBroke');
    expect(ends[0]!.kind !== 'running' && ends[0]!.atS).toBeCloseTo(
      ends[1]!.kind !== 'running' ? ends[1]!.atS : NaN,
      4,
    );
  });

  it('are nearly all ticks of a running line', () => {
    expect(quietShare(aScenario(), 6000)).toBeGreaterThan(0.97);
    expect(quietShare(c.DOCUMENT, 4000)).toBeGreaterThan(0.97);
  });

  it('fill every column of a row', () => {
    const block = new TraceBlock(2000);
    block.rows.fill(NaN);
    new Simulation(readScenario(aScenario())).advance(2000, block);

    expect(block.rows.some(Number.isNaN)).toBeFalse();
  });
});

/** Documents that each bring one more term into the loop. */
function variants(): Readonly<Record<string, Scenario>> {
  const moving: Parts = {
    durationS: 40,
    lineRoundS: 0.5,
    line: [
      {atS: 0.5, command: 'run', speedMps: 2, rampS: 5},
      {atS: 15, command: 'run', speedMps: 3, rampS: 4},
      {atS: 25, command: 'stop', rampS: 6},
    ],
  };
  const of = (parts: Parts): Scenario => aScenario({...moving, ...parts});
  return {
    'dead time within a tick': of({brake: {deadTimeS: 0.034}}),
    'no dead time, no lag': of({brake: {lagS: 0, deadTimeS: 0}}),
    'play, stick and supply': of({
      brake: {playPct: 1, stickPct: 0.3},
      actions: [{atS: 12, disturb: {supply: 0.9}}],
    }),
    'a bent curve': of({
      brake: {
        curve: [
          [0, 0],
          [30, 0.2],
          [42, 0.45],
          [100, 1],
        ],
      },
    }),
    'grip, friction, idlers': of({
      brake: {breakaway: 1.4, breakawayRadps: 3},
      roll: {coulombNm: 1.5, viscousNmS: 0.4},
      span: {idlerDragN: 6, idlerMassKg: 12},
    }),
    'oval and eccentric near the core': of({
      roll: {radiusM: 0.1, eccentricityM: 0.001, ovalM: 0.0005},
    }),
    'hot and fading': of({
      brake: {capacityJPerK: 60, conductanceWPerK: 3, fadePerK: 0.003, fadeStartC: 30},
    }),
    'corrected sensor': of({
      sensing: {zeroN: 12, spanPct: 80},
      controller: {zeroAdjustN: 12, spanAdjustPct: 125, inputFilterS: 0.05},
    }),
    'back calculation at a limit': of({
      controller: {antiWindup: 'backCalculation', trackingS: 0.4, outMaxPct: 38, tdS: 0.03},
    }),
    'no anti-windup at a limit': of({controller: {antiWindup: 'none', outMaxPct: 38}}),
    'gain with radius, assist': of({
      controller: {radiusCompensation: true, radiusRefM: 0.3, inertiaAssistPct: 80},
    }),
    'gain by radius, counted': of({
      controller: {
        gainByRadius: [
          [0.1, 0.4],
          [0.3, 1.2],
        ],
        radiusSource: 'counted',
        radiusEnteredM: 0.3,
        caliperEnteredM: 5e-5,
      },
    }),
    'set point rate, proportional only': of({
      controller: {setPointRateNps: 15, tiS: 0, setPointWeight: 0.7},
      actions: [{atS: 12, set: {setPointN: 170}}],
    }),
    'output rate and resolution': of({controller: {outRatePctPerS: 8, outStepPct: 0.1}}),
    'by hand': of({controller: {mode: 'manual', manualPct: 40}}),
    'a dancer': aDancerScenario(moving),
    'a dancer, uneven roll, dead time': aDancerScenario({
      ...moving,
      roll: {eccentricityM: 0.001},
      brake: {deadTimeS: 0.025},
    }),
    'a slow sample': of({controller: {sampleS: 0.05}}),
    'a quick sample': of({controller: {sampleS: 0.004}}),
  };
}
