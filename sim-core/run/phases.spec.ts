import {aDancerScenario, aScenario} from '../test-support/a-scenario';
import {record} from '../test-support/record';
import {startRun} from './replay';

const RUN = {atS: 1, command: 'run', speedMps: 2, rampS: 4} as const;

// Times and outputs follow from the table of phases in PHYSICS.md. `outputPct` of a row is the tick before's.
describe('phases', () => {
  it('go from standstill through starting, running and stopping back to standstill', () => {
    const {phaseAt, at} = record(aScenario({line: [RUN, {atS: 8, command: 'stop', rampS: 2}]}), 14);

    expect([0.99, 1, 2.99, 3, 7.99, 8, 10.99, 11].map(phaseAt)).toEqual([
      'standstill',
      'starting',
      'starting',
      'running',
      'running',
      'stopping',
      'stopping',
      'standstill',
    ]);
    const stopOutput = at(8, 'outputPct');
    expect(at(8.01, 'outputPct')).toBeCloseTo(1.2 * stopOutput, 9);
    expect(at(11, 'outputPct')).toBeCloseTo(1.2 * stopOutput, 9);
    expect(at(11.01, 'outputPct')).toBe(40);
  });

  it('ramp the set point from its fraction', () => {
    const {at} = record(aScenario({line: [RUN]}), 4);

    expect(at(0.5, 'setPointN')).toBe(120);
    expect(at(1, 'setPointN')).toBe(60);
    expect(at(2, 'setPointN')).toBeCloseTo(90, 9);
    expect(at(3, 'setPointN')).toBe(120);
  });

  it('skip starting without ramp and start output', () => {
    const {phaseAt} = record(aScenario({controller: {startRampS: 0}, line: [RUN]}), 2);

    expect(phaseAt(1)).toBe('running');
  });

  it('hold the start output until its time is over, for a dancer always', () => {
    const controller = {startOutputPct: 12, startHoldS: 1, closeAboveN: 0};
    const {phaseAt, at} = record(aDancerScenario({controller, line: [RUN]}), 6);

    expect(at(1.01, 'outputPct')).toBe(12);
    expect(at(2, 'outputPct')).toBe(12);
    expect(at(2, 'setPointN')).toBe(60);
    expect(at(3, 'setPointN')).toBeCloseTo(90, 9);
    expect([3.99, 4].map(phaseAt)).toEqual(['starting', 'running']);
  });

  it('close the loop at once when the web is taut already', () => {
    const controller = {startOutputPct: 12, startHoldS: 9, closeAboveN: 20};
    const {at, phaseAt} = record(aScenario({controller, line: [RUN]}), 4);

    expect(at(1.5, 'setPointN')).toBeCloseTo(75, 9);
    expect(phaseAt(3)).toBe('running');
  });

  it('keep the PID on until the line stands when there is no stop-hold', () => {
    const controller = {stopHoldS: 0};
    const {phaseAt, at} = record(
      aScenario({controller, line: [RUN, {atS: 8, command: 'stop', rampS: 2}]}),
      11,
    );

    expect([9.99, 10].map(phaseAt)).toEqual(['stopping', 'standstill']);
    expect(at(9, 'outputPct')).not.toBe(at(9.5, 'outputPct'));
  });

  it('use the fast stop gain and time where given', () => {
    const controller = {fastStopGain: 1.5, fastStopHoldS: 1};
    const {at} = record(
      aScenario({controller, line: [RUN, {atS: 8, command: 'fastStop', rampS: 2}]}),
      10,
    );

    expect(at(8.01, 'outputPct')).toBeCloseTo(1.5 * at(8, 'outputPct'), 9);
    expect(at(9.01, 'outputPct')).toBe(40);
  });

  it('go straight to running when a run comes while stopping', () => {
    const {phaseAt} = record(
      aScenario({line: [RUN, {atS: 8, command: 'stop', rampS: 4}, {...RUN, atS: 9}]}),
      10,
    );

    expect([8.99, 9].map(phaseAt)).toEqual(['stopping', 'running']);
  });

  it('end a stop that a run of the same tick took back', () => {
    const run = startRun(aScenario({line: [RUN]}));
    run.advance(800);
    run.act({line: {command: 'stop', rampS: 2}});
    run.act({line: {command: 'run', speedMps: 2, rampS: 2}});
    run.advance(300);

    expect(run.view().phase).toBe('running');
    expect(run.view().lineMps).toBeCloseTo(2, 9);
  });

  it('put out the manual output and come back without a bump', () => {
    const run = startRun(aScenario({line: [RUN]}));
    run.advance(1000);
    run.act({set: {mode: 'manual', manualPct: 31}});
    run.advance(1);
    expect(run.view().phase).toBe('manual');
    expect(run.view().outputPct).toBe(31);

    run.advance(20);
    run.act({set: {mode: 'automatic', setPointWeight: 0.2}});
    run.advance(1);

    expect(run.view().phase).toBe('running');
    expect(run.view().outputPct).toBeCloseTo(31, 9);
  });

  it('jump to the old I when bumpless is off', () => {
    const run = startRun(aScenario({controller: {bumpless: false}, line: [RUN]}));
    run.advance(1000);
    const before = run.view().outputPct;
    run.act({set: {mode: 'manual', manualPct: 90}});
    run.advance(1);
    run.act({set: {mode: 'automatic'}});
    run.advance(1);

    expect(Math.abs(run.view().outputPct - before)).toBeLessThan(3);
  });
});

describe('the set point now', () => {
  it('moves at its rate while running', () => {
    const scenario = aScenario({
      controller: {setPointRateNps: 20},
      line: [RUN],
      actions: [{atS: 8, set: {setPointN: 140}}],
    });
    const {at} = record(scenario, 10);

    expect(at(8, 'setPointN')).toBeCloseTo(120.2, 9);
    expect(at(8.49, 'setPointN')).toBeCloseTo(130, 9);
    expect(at(9.5, 'setPointN')).toBe(140);
  });
});

describe('the radius believed', () => {
  const compensation = (set: object, lengthS: number): number => {
    const scenario = aScenario({
      controller: {radiusCompensation: true, radiusRefM: 0.3, kp: 0, tiS: 0, ...set},
      line: [RUN],
    });
    // with Kp 0 and I a bias the output is I·R_c/R_ref: its change shows R_c
    const {at} = record(scenario, lengthS);
    return at(lengthS, 'outputPct') / at(20, 'outputPct');
  };
  const trueRatio = (): number => {
    const {at} = record(aScenario({line: [RUN], controller: {kp: 0, tiS: 0}}), 40);
    return at(40, 'radiusM') / at(20, 'radiusM');
  };

  it('counts down by the caliper entered', () => {
    const counted = {radiusSource: 'counted', radiusEnteredM: 0.3, caliperEnteredM: 5e-5} as const;

    expect(compensation(counted, 40)).toBeCloseTo(trueRatio(), 4);
    expect(compensation({...counted, caliperEnteredM: 0}, 40)).toBeCloseTo(1, 9);
  });

  it('follows the ratio of the speeds', () => {
    const ratio = {radiusSource: 'ratio', radiusEnteredM: 0.3} as const;

    expect(compensation(ratio, 40)).toBeCloseTo(trueRatio(), 3);
  });
});
