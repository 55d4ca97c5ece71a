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

  it('places a peak that is reached twice where it came first', () => {
    const trace = aTrace(10, {tensionN: (row) => (row === 3 || row === 7 ? 280 : 200)});

    expect(peak(trace, {from: 0, to: 10})?.place.fromTick).toBe(3);
  });

  it('counts the share of rows in tolerance, both edges in it', () => {
    const values = [189.9, 190, 200, 210, 210.1];
    const trace = aTrace(100, {tensionN: (row) => values[row % 5]!});

    expect(shareInTolerance(trace, {from: 0, to: 100}, {lowestN: 190, highestN: 210})?.value).toBe(
      0.6,
    );
    expect(shareInTolerance(trace, {from: 100, to: 200}, {lowestN: 0, highestN: 1})).toBeNull();
  });

  it('says when tension stays in the band, and null when it ends outside', () => {
    const trace = aTrace(300, {tensionN: (row) => (row < 120 ? 150 : 200)});
    const band = {lowestN: 190, highestN: 210};

    expect(onTargetBy(trace, {from: 20, to: 300}, band, SAMPLE_S)?.value).toBeCloseTo(1, 10);
    expect(onTargetBy(trace, {from: 20, to: 100}, band, SAMPLE_S)).toBeNull();
    const fromAbove = aTrace(300, {tensionN: (row) => (row < 120 ? 250 : 200)});
    expect(onTargetBy(fromAbove, {from: 20, to: 300}, band, SAMPLE_S)?.value).toBeCloseTo(1, 10);
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

  it('counts a loop of just 5 mm, and one that is still there at the end', () => {
    const trace = aTrace(50, {slackM: (row) => (row < 20 ? 0 : 0.03)});
    const least = aTrace(50, {slackM: (row) => (row < 20 ? 0 : 0.005)});

    expect(loopM(trace, {from: 0, to: 50}, SAMPLE_S)?.value).toBe(0.03);
    expect(loopM(trace, {from: 0, to: 40}, SAMPLE_S)).toEqual({
      value: 0.03,
      place: {fromTick: 20, toTick: 39, trace: 'tension'},
    });
    expect(loopM(least, {from: 0, to: 50}, SAMPLE_S)?.value).toBe(0.005);
  });

  it('gives the longest of several loops, a short snap among them left out', () => {
    const lengths: readonly (readonly [from: number, to: number, slackM: number])[] = [
      [10, 20, 0.04],
      [30, 40, 0.09],
      [50, 53, 0.3], // 30 ms: too short to count
      [60, 70, 0.02],
    ];
    const slackAt = (row: number): number =>
      lengths.find(([from, to]) => row >= from && row < to)?.[2] ?? 0;

    expect(loopM(aTrace(100, {slackM: slackAt}), {from: 0, to: 100}, SAMPLE_S)).toEqual({
      value: 0.09,
      place: {fromTick: 30, toTick: 39, trace: 'tension'},
    });
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
    const trace = aTrace(500, {tensionN: (row) => (row < 400 ? 300 : row < 450 ? 100 : 140)});

    expect(tensionAtRest(trace, {from: 0, to: 500}, SAMPLE_S)?.value).toBe(120);
    expect(tensionAtRest(trace, {from: 440, to: 460}, SAMPLE_S)?.value).toBe(120);
    expect(tensionAtRest(trace, {from: 500, to: 600}, SAMPLE_S)).toBeNull();
  });

  it('finds the hottest moment', () => {
    const trace = aTrace(10, {brakeC: (row) => 25 + row});

    expect(hottest(trace, {from: 0, to: 10})?.value).toBe(34);
  });
});
