import * as control from '../control/controller-state';
import {moveRadius} from '../control/radius';
import * as seen from '../control/seen';
import * as set from '../control/tuning';
import * as now from '../plant/evaluation';
import * as place from '../plant/plant-state';
import {fixRoll, inertia, radiusSquare, woundLength} from '../plant/roll';
import {aPlant} from '../test-support/a-plant';
import {plainRefA, refA} from '../test-support/ref-a';
import {record} from '../test-support/record';
import {near, within} from '../test-support/within';

// Numbers of table M of the project's handbook; A: closed form, worked out outside the engine.
describe('the unwind roll', () => {
  const n = new Float64Array(now.EVALUATION_SIZE);
  fixRoll(n, refA());
  const full = woundLength(n, 0.5);

  it('holds 7775.442 m of web at R 0.5 m (handbook M 5; A, B-1)', () => {
    expect(full).toEqual(near(7775.442, 1e-3));
  });

  it('holds them in 4500 turns (handbook M 6; A, B-2)', () => {
    // turns = ∫ dλ/(2πR(λ)) over the engine's own R(λ); in R the integrand is smooth: Simpson in z with λ = full·z²
    const steps = 2000;
    let sum = 0;
    for (let i = 0; i <= steps; i++) {
      const z = i / steps;
      const radius = Math.sqrt(radiusSquare(n, full * z * z));
      const weight = i === 0 || i === steps ? 1 : i % 2 === 0 ? 2 : 4;
      sum += (weight * full * 2 * z) / (2 * Math.PI * radius);
    }

    expect(sum / (3 * steps)).toEqual(near(4500, 1e-6)); // exact but for Simpson's rule
  });

  it('pays out 2827.433 m in 1000 turns from R 0.5 m and is then 0.4 m (handbook M 7; A, B-3, B-4)', () => {
    expect(full - woundLength(n, 0.4)).toEqual(near(2827.433, 1e-3));
    expect(Math.sqrt(radiusSquare(n, full - 2827.433388))).toEqual(near(0.4, 1e-9));
    // the controller that counts turns by the caliper comes to the same
    const state = new Float64Array(control.CONTROLLER_SIZE);
    const tuning = new Float64Array(set.TUNING_SIZE);
    const news = new Float64Array(seen.SEEN_SIZE);
    state[control.RADIUS] = 0.5;
    tuning[set.SOURCE] = set.COUNTED;
    tuning[set.CALIPER] = 1e-4;
    tuning[set.SAMPLE_S] = 0.01;
    news[seen.OMEGA] = 2 * Math.PI; // a turn in 100 ticks
    for (let tick = 0; tick < 100_000; tick++) moveRadius(state, tuning, news);
    expect(state[control.RADIUS]).toEqual(near(0.4, 1e-9));
  });

  it('weighs 622.04 kg and has 78.932 kg·m² at R 0.5 m (handbook M 8; A, B-6, B-7)', () => {
    expect(800 * refA().web.widthM * refA().web.thicknessM * full).toEqual(within(622.04, 1e-4));
    expect(inertia(n, 0.25)).toEqual(within(78.932, 1e-4));
  });

  for (const [radiusM, expected] of [
    [0.25, 5.3009],
    [0.1, 0.51781],
    [0.06, 0.40843],
  ] as const)
    it(`has ${expected} kg·m² at R ${radiusM} m (handbook M 9; A)`, () => {
      expect(inertia(n, radiusM * radiusM)).toEqual(within(expected, 1e-4));
    });

  it('weighs 315.73 kg at the web (handbook M 10; A)', () => {
    expect(inertia(n, 0.25) / 0.25).toEqual(within(315.73, 1e-4));
  });

  it('turns at 4.000 rad/s, 38.197 rpm, 0.6366 Hz at 2 m/s (handbook M 11; A)', () => {
    // wound and run at the same tension: the surface runs as fast as the nip
    const {at} = record(plainRefA({roll: {woundTensionN: 200}}), 20);
    const omega = at(20, 'rollRadps');

    expect(omega).toEqual(within(4, 1e-4));
    expect((omega * 60) / (2 * Math.PI)).toEqual(within(38.197, 1e-4));
    expect(omega / (2 * Math.PI)).toEqual(within(0.6366, 1e-4));
  });

  it('shrinks by 6.366e-4 m/s at R 0.05 m and 2 m/s (handbook M 12; A, B-5)', () => {
    // B-5 leaves strain out: 2 N here, 5e-6 (the engine counts relaxed web); at its core a roll has λ = 0
    const scenario = refA({roll: {radiusM: 0.05, woundTensionN: 2, coulombNm: 0, viscousNmS: 0}});
    const {y, torqueNm, slopes} = aPlant(scenario, {tensionN: 2, lineMps: 2});
    const {slope} = slopes(y, torqueNm);
    const afterMs = Math.sqrt(radiusSquare(n, 0.001 * slope[place.WOUND]!));
    const beforeMs = Math.sqrt(radiusSquare(n, -0.001 * slope[place.WOUND]!));

    expect((afterMs - beforeMs) / 0.002).toEqual(within(-6.366e-4, 1e-4));
  });
});
