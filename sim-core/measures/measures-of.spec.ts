import {decay} from '../signal/decay';
import {sine, TWO_PI} from '../signal/sine';
import {aTrace} from '../test-support/a-trace';
import {absoluteErrorNs, brakeEnergyJ, stretchedM, timedErrorNs2} from './integrals';
import {measuresOf} from './measures-of';
import {oscillation} from './oscillation';

const SAMPLE_S = 0.001;
const AGAINST = {sampleS: SAMPLE_S, targetN: 200, lowestPct: 0, highestPct: 100};

// Closed forms of textbooks, named at each value (handbook G.6; M 72, 73).
describe('integrals of the error', () => {
  // an error a·e^(−t/τ): IAE = a·τ, ITAE = a·τ²
  const fading = aTrace(20_000, {tensionN: (row) => 200 - 40 * decay((row * SAMPLE_S) / 0.8)});
  const whole = {from: 0, to: 20_000};

  it('are a·τ and a·τ² for an error that fades with time constant τ', () => {
    expect(absoluteErrorNs(fading, whole, 200, SAMPLE_S)!.value).toBeCloseTo(32, 1);
    expect(timedErrorNs2(fading, whole, 200, SAMPLE_S)!.value).toBeCloseTo(25.6, 1);
  });

  it('count errors of both signs, from the span’s own beginning', () => {
    const both = aTrace(2000, {tensionN: (row) => (row < 1000 ? 210 : 190)});

    expect(absoluteErrorNs(both, {from: 0, to: 2000}, 200, SAMPLE_S)!.value).toBeCloseTo(20, 9);
    expect(timedErrorNs2(both, {from: 1000, to: 2000}, 200, SAMPLE_S)!.value).toBeCloseTo(5, 1);
    expect(absoluteErrorNs(both, {from: 2000, to: 2000}, 200, SAMPLE_S)).toBeNull();
  });
});

describe('brake energy and stretched web', () => {
  // 50 N·m at 8 rad/s are 400 W (handbook M 29)
  it('are torque × speed × time, and the web that passed beyond the limit', () => {
    const trace = aTrace(3000, {
      torqueNm: () => 50,
      rollRadps: () => 8,
      lineMps: () => 2,
      tensionN: (row) => (row < 1000 ? 300 : 200),
    });
    const whole = {from: 0, to: 3000};

    expect(brakeEnergyJ(trace, whole, SAMPLE_S)!.value).toBeCloseTo(1200, 6);
    expect(stretchedM(trace, whole, 250, SAMPLE_S)!.value).toBeCloseTo(2, 6);
  });
});

describe('oscillation', () => {
  /** Swing of 60 N about 200 N, 0.5 s a period, that loses a share of its height each period. */
  const swinging = (dampingPerS: number) =>
    aTrace(8000, {
      tensionN: (row) => {
        const t = row * SAMPLE_S;
        return 200 + 60 * decay(dampingPerS * t) * sine((TWO_PI * t) / 0.5);
      },
    });
  const whole = {from: 0, to: 8000};

  it('finds the period 2π/ω_d and a decay ratio of a quarter (handbook M 73)', () => {
    // e^(−σ·0.5 s) = 1/4
    const found = oscillation(swinging(2.772588722239781), whole, SAMPLE_S)!;

    expect(found.periodS).toBeCloseTo(0.5, 2);
    expect(found.decayRatio).toBeCloseTo(0.25, 2);
  });

  it('finds an undamped swing with its amplitude and a ratio of 1', () => {
    const found = oscillation(swinging(0), whole, SAMPLE_S)!;

    expect(found.periodS).toBeCloseTo(0.5, 2);
    expect(found.amplitudeN).toBeCloseTo(60, 0);
    expect(found.decayRatio).toBeCloseTo(1, 2);
  });

  it('finds none where nothing swings, or too little is there', () => {
    const still = aTrace(1000, {tensionN: () => 200});

    expect(oscillation(still, {from: 0, to: 1000}, SAMPLE_S)).toBeNull();
    expect(oscillation(still, {from: 0, to: 4}, SAMPLE_S)).toBeNull();
    expect(oscillation(still, {from: 2000, to: 3000}, SAMPLE_S)).toBeNull();
  });

  it('takes noise on a swing for no swing of its own', () => {
    const noisy = aTrace(8000, {
      tensionN: (row) =>
        200 + 60 * sine((TWO_PI * row * SAMPLE_S) / 0.5) + (row % 3 === 0 ? 2 : -1),
    });

    expect(oscillation(noisy, whole, SAMPLE_S)!.periodS).toBeCloseTo(0.5, 1);
  });
});

describe('measuresOf', () => {
  it('gives every measure of a step, in per cent of the target where that is asked', () => {
    // first order from 160 to 200 N: rise time 2.197·τ (ln 9)
    const trace = aTrace(10_000, {
      tensionN: (row) => 200 - 40 * decay((row * SAMPLE_S) / 0.8),
      outputPct: (row) => (row === 500 ? 42 : 40),
      rollRadps: () => 8,
      lineMps: () => 2,
      brakeC: () => 31,
      torqueNm: () => 50,
    });
    const found = measuresOf(trace, {from: 0, to: 10_000}, {...AGAINST, stepFromN: 160});

    expect(found.leastN).toBeCloseTo(160, 9);
    expect(found.leastPct).toBeCloseTo(80, 9);
    expect(found.peakPct).toBeCloseTo(100, 2);
    expect(found.overshootPct).toBe(0);
    expect(found.riseTimeS).toBeCloseTo(0.8 * 2.1972245773362196, 2);
    expect(found.greatestOutputPct).toBe(42);
    expect(found.brakeMovementPctPerS).toBeCloseTo(0.4, 3);
    expect(found.hottestC).toBe(31);
    expect(found.stretchedM).toBeNull();
    expect(found.swingPeriodS).toBeNull();
  });

  it('gives nothing for a window without rows, and no overshoot without a step', () => {
    const nothing = measuresOf(aTrace(5, {}), {from: 5, to: 5}, AGAINST);

    expect(Object.values(nothing).every((value) => value === null)).toBeTrue();
    expect(measuresOf(aTrace(50, {}), {from: 0, to: 50}, AGAINST).overshootPct).toBeNull();
  });
});
