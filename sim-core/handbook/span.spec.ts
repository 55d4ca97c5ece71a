import {
  exactSteadyN,
  leavingSpeedFor,
  linearSteadyN,
  linearTensionAfter,
  spanTimeS,
} from '../analysis/index';
import * as place from '../plant/plant-state';
import {aPlant, type APlant} from '../test-support/a-plant';
import {plainRefA} from '../test-support/ref-a';
import {record} from '../test-support/record';
import {near, within} from '../test-support/within';

const WOUND_100 = plainRefA({web: {lossTimeS: 0}, roll: {woundTensionN: 100}});
const POINT = {stiffnessN: 4e5, spanM: 2, enteringN: 100, enteringMps: 2, leavingMps: 2.001};

/** Slope of the web in the span [m/s] when it holds `lengthM`, at the roll speed in `y`. */
function lengthSlope({y, torqueNm, slopes}: APlant, lengthM: number): number {
  const moved = y.slice();
  moved[place.LENGTH] = lengthM;
  return slopes(moved, torqueNm).slope[place.LENGTH]!;
}

/** Tension [N] at which the engine's span stands still between a surface speed and a nip speed. */
function steadyTension(surfaceMps: number, nipMps: number): number {
  const stand = aPlant(WOUND_100, {tensionN: 200, lineMps: nipMps});
  stand.y[place.OMEGA] = surfaceMps / stand.plant.stand.radius();
  // while taut the slope is a straight line in ℓ
  const [one, other] = [1.998, 1.9995];
  const slopeOne = lengthSlope(stand, one);
  const slopeOther = lengthSlope(stand, other);
  stand.y[place.LENGTH] = one - (slopeOne * (other - one)) / (slopeOther - slopeOne);
  return stand.slopes(stand.y, stand.torqueNm).tensionN;
}

// Numbers of table M of the project's handbook; A: closed form. The engine's span is the exact one (A-1 … A-3);
// the linear form is analysis/linear/span.ts.
describe('the span', () => {
  it('has a time constant of 1.0 s between rolls of given speed (handbook M 16; A, A-6)', () => {
    const stand = aPlant(WOUND_100, {tensionN: 200, lineMps: 2});
    const rate = (lengthSlope(stand, 1.999) - lengthSlope(stand, 1.9985)) / 0.0005;

    expect(-1 / rate).toBeCloseTo(1, 9);
    expect(spanTimeS({...POINT, leavingMps: 2})).toBe(1);
  });

  it('keeps its tension at rest (handbook M 16; A, A-6)', () => {
    // the brake holds more than the web pulls
    const {at} = record(plainRefA({line: [], controller: {manualPct: 60}}), 10);

    expect(at(10, 'tensionN')).toEqual(near(200, 1e-9));
    expect(linearTensionAfter({...POINT, enteringMps: 0, leavingMps: 0}, 200, 100)).toBe(200);
  });

  it('comes to 300.050 N exactly, 299.850 N linear, from 2 to 2.001 m/s (handbook M 17; A, A-7, A-8)', () => {
    expect(steadyTension(2, 2.001)).toEqual(near(300.05, 1e-3));
    expect(exactSteadyN(POINT)).toEqual(near(300.05, 1e-3));
    expect(linearSteadyN(POINT)).toEqual(near(299.85, 1e-3));
  });

  it('needs 2.0005002501 m/s for 200 N in the linear form (handbook M 18; A)', () => {
    const leavingMps = leavingSpeedFor(200, POINT);

    expect(leavingMps).toEqual(near(2.0005002501, 1e-9));
    // the engine's exact span differs from it by the size of its strain, 5e-4
    expect(steadyTension(2, leavingMps)).toEqual(within(200, 5e-4));
  });

  it('goes from 200 N to 263.167 N in 1 s and to 299.900 N, linear (handbook M 19; A)', () => {
    const point = {...POINT, leavingMps: leavingSpeedFor(200, POINT) + 0.0005};

    expect(linearTensionAfter(point, 200, 1)).toEqual(near(263.167, 0.01));
    expect(linearSteadyN(point)).toEqual(near(299.9, 0.01));
    expect(steadyTension(2, point.leavingMps)).toEqual(within(299.9, 1e-3)); // by its strain, 7.5e-4
  });

  it('tightens at 2000 N/s when the nip is 0.01 m/s faster (handbook M 39; A)', () => {
    // dT/dt = −EA·L/ℓ²·dℓ/dt; the form EA·Δv/L is its limit for small strain, hence 2e-4 N
    const tensionN = 2e-4;
    const stand = aPlant(plainRefA(), {tensionN, lineMps: 2.01});
    const lengthM = stand.y[place.LENGTH]!;
    stand.y[place.OMEGA] = stand.y[place.OMEGA]! * (2 / 2.01);
    const slope = (-4e5 * 2 * lengthSlope(stand, lengthM)) / (lengthM * lengthM);

    expect(slope).toEqual(within(2000, 1e-8));
  });

  it('tightens so in its first milliseconds, in a run at 200 N (handbook M 39; A)', () => {
    const line = [
      {atS: 0, command: 'run', speedMps: 2, rampS: 10},
      {atS: 40, command: 'run', speedMps: 2.01, rampS: 0},
    ] as const;
    const {at} = record(plainRefA({web: {lossTimeS: 0}, line}), 40.01);

    // after 1 ms the roll has followed by (ωn·t)²/6 = 1e-4 and the nip carried off v·t/2L = 5e-4; strain adds 5e-4
    expect((at(40.001, 'tensionN') - at(40, 'tensionN')) / 0.001).toEqual(within(2000, 1e-3));
  });
});
