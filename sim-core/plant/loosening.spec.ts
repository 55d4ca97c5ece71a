import {type LogEntry} from '../run/log';
import {replay, startRun} from '../run/replay';
import {LIVELY} from '../test-support/a-live-log';
import {aScenario} from '../test-support/a-scenario';
import {Equations} from './equations';

/**
 * A brake that lets go slowly toward what the web pulls: closed form, at rest tension × radius may not pass what
 * brake and bearings hold, and it comes to lie just there.
 */
const FULL_ROLL = aScenario({
  initialTensionN: 200,
  lineRoundS: 1,
  web: {widthM: 1, thicknessM: 1e-4, modulusPa: 4e9, densityKgM3: 800, lossTimeS: 0.005},
  roll: {
    coreRadiusM: 0.05,
    radiusM: 0.5,
    coreInertiaKgM2: 0.4,
    woundTensionN: 100,
    coulombNm: 0.5,
    viscousNmS: 0.05,
  },
  span: {lengthM: 2, idlerDragN: 4},
  brake: {
    maxTorqueNm: 250,
    residualTorqueNm: 1.5,
    lagS: 0.3,
    deadTimeS: 0.1,
    capacityJPerK: 5000,
    conductanceWPerK: 6.67,
  },
  sensing: {rangeN: 500, filterS: 0.1},
  controller: {
    kp: 0.2,
    setPointN: 200,
    startRampS: 4,
    startFraction: 0.7,
    stopHoldS: 6,
    stopHoldGain: 1.4,
  },
  line: [],
});

describe('a held roll that the web loosens', () => {
  it('costs a bounded number of evaluations a tick, also while it lies at the edge', () => {
    const run = startRun(FULL_ROLL);
    run.act({line: {command: 'run', speedMps: 2, rampS: 10}});
    run.advance(2000);
    run.act({line: {command: 'stop', rampS: 4}});
    const slopes = spyOn(Equations.prototype, 'slopes').and.callThrough();

    let most = 0;
    for (let tick = 0; tick < 1500; tick++) {
      slopes.calls.reset();
      run.advance(1);
      most = Math.max(most, slopes.calls.count());
    }

    // 40 without a bend; locating one jump to 30 ns takes about 16 × 2 steps of 4.
    expect(most).toBeLessThan(1500);
    const {tensionN, radiusM, torqueNm, rollRadps} = run.view();
    expect(Math.abs(rollRadps)).toBeLessThan(1e-9);
    expect((tensionN * radiusM) / (torqueNm + 0.5)).toBeCloseTo(1, 5);
  });

  it('replays to the same bytes as it ran', () => {
    const run = startRun(LIVELY);
    const entries: LogEntry[] = [run.act({line: {command: 'run', speedMps: 2, rampS: 5}})];
    run.advance(900);
    entries.push(run.act({line: {command: 'stop', rampS: 3}}));
    run.advance(900);

    expect(replay(LIVELY, entries, 1800).hash()).toBe(run.hash());
  });
});
