import {aTrace} from '../test-support/a-trace';
import {onTargetBy, shareInTolerance} from './band';
import {hottest, least, peak} from './extremes';
import {brakeMovement, greatestOutputPct, timeAtLimitS} from './output';
import {tensionAtRest} from './rest';
import {loopM, runOnM} from './slack';
import {overshootPct, riseTimeS} from './step';

const SAMPLE_S = 0.01;

// Closed forms of the traces made in each spec; what is measured is said at each function.
describe('measures', () => {
  it('finds peak and least with their places', () => {
    const trace = aTrace(100, {
      tensionN: (row) => 200 + (row === 30 ? 80 : 0) - (row === 60 ? 150 : 0),
    });
    const whole = {from: 0, to: 100};

    expect(peak(trace, whole)).toEqual({
      value: 280,
      place: {fromTick: 30, toTick: 30, trace: 'tension'},
    });
    expect(least(trace, whole)?.value).toBe(50);
    expect(peak(trace, {from: 31, to: 100})?.value).toBe(200);
    expect(peak(trace, {from: 100, to: 200})).toBeNull();
  });

  it('counts the share of rows in tolerance', () => {
    const trace = aTrace(100, {tensionN: (row) => (row < 25 ? 150 : 200)});

    expect(shareInTolerance(trace, {from: 0, to: 100}, {lowestN: 190, highestN: 210})?.value).toBe(
      0.75,
    );
  });

  it('says when tension stays in the band, and null when it ends outside', () => {
    const trace = aTrace(300, {tensionN: (row) => (row < 120 ? 150 : 200)});
    const band = {lowestN: 190, highestN: 210};

    expect(onTargetBy(trace, {from: 20, to: 300}, band, SAMPLE_S)?.value).toBeCloseTo(1, 10);
    expect(onTargetBy(trace, {from: 20, to: 100}, band, SAMPLE_S)).toBeNull();
  });

  it('leaves a once-per-turn ripple out of "on target by"', () => {
    // One turn in 0.5 s (50 rows): ripple ±30 N around 200 N, far outside ±10 N; its mean over a turn is 200 N.
    const trace = aTrace(400, {
      tensionN: (row) => 200 + 30 * Math.sin((2 * Math.PI * row) / 50),
      rollRadps: () => (2 * Math.PI) / 0.5,
    });

    const reached = onTargetBy(trace, {from: 0, to: 400}, {lowestN: 190, highestN: 210}, SAMPLE_S);

    expect(reached?.value).toBeLessThan(0.6);
  });

  it('gives overshoot in percent of the change, up and down', () => {
    const up = aTrace(100, {tensionN: (row) => (row === 50 ? 246 : 240)});
    const down = aTrace(100, {tensionN: (row) => (row === 50 ? 195 : 200)});

    expect(overshootPct(up, {from: 0, to: 100}, {fromN: 200, toN: 240})?.value).toBeCloseTo(15, 10);
    expect(overshootPct(down, {from: 0, to: 100}, {fromN: 240, toN: 200})?.value).toBeCloseTo(
      12.5,
      10,
    );
    expect(overshootPct(up, {from: 0, to: 100}, {fromN: 240, toN: 240})).toBeNull();
  });

  it('measures the rise of a first-order answer as 2.197 time constants', () => {
    // Closed form: ln(9) = 2.1972 time constants from 10 to 90 %.
    const trace = aTrace(1000, {tensionN: (row) => 100 * (1 - Math.exp((-row * SAMPLE_S) / 0.8))});

    const rise = riseTimeS(trace, {from: 0, to: 1000}, {fromN: 0, toN: 100}, SAMPLE_S);

    expect(Math.abs(rise!.value - 0.8 * Math.log(9))).toBeLessThanOrEqual(SAMPLE_S);
  });

  it('counts a loop from 5 mm and 50 ms', () => {
    const loops = (slackM: number, rows: number): number | undefined =>
      loopM(
        aTrace(100, {slackM: (row) => (row >= 10 && row < 10 + rows ? slackM : 0)}),
        {from: 0, to: 100},
        SAMPLE_S,
      )?.value;

    expect(loops(0.12, 20)).toBe(0.12);
    expect(loops(0.004, 20)).toBe(0);
    expect(loops(0.12, 4)).toBe(0);
    expect(loops(0.12, 5)).toBe(0.12);
  });

  it('counts a loop that is still there at the end', () => {
    const trace = aTrace(50, {slackM: (row) => (row < 20 ? 0 : 0.03)});

    expect(loopM(trace, {from: 0, to: 50}, SAMPLE_S)?.value).toBe(0.03);
  });

  it('adds up the web paid out after the line stood', () => {
    const trace = aTrace(100, {
      lineMps: (row) => (row < 50 ? 1 : 0),
      rollRadps: (row) => (row < 75 ? 2 : 0),
      radiusM: () => 0.5,
    });

    // 25 rows of 2 rad/s × 0.5 m × 0.01 s
    expect(runOnM(trace, {from: 0, to: 100}, SAMPLE_S)?.value).toBeCloseTo(0.25, 10);
    expect(runOnM(trace, {from: 0, to: 50}, SAMPLE_S)).toBeNull();
  });

  it('sums the brake movement per second and the time at the limits', () => {
    const trace = aTrace(101, {outputPct: (row) => (row % 2 === 0 ? 100 : 99)});
    const whole = {from: 0, to: 101};

    expect(brakeMovement(trace, whole, SAMPLE_S)?.value).toBeCloseTo(100, 10);
    expect(
      timeAtLimitS(trace, whole, {lowestPct: 0, highestPct: 100}, SAMPLE_S)?.value,
    ).toBeCloseTo(0.51, 10);
    expect(greatestOutputPct(trace, whole)?.value).toBe(100);
  });

  it('means tension at rest over the last second only', () => {
    const trace = aTrace(500, {tensionN: (row) => (row < 400 ? 300 : 136)});

    expect(tensionAtRest(trace, {from: 0, to: 500}, SAMPLE_S)?.value).toBe(136);
  });

  it('finds the hottest moment', () => {
    const trace = aTrace(10, {brakeC: (row) => 25 + row});

    expect(hottest(trace, {from: 0, to: 10})?.value).toBe(34);
  });
});
