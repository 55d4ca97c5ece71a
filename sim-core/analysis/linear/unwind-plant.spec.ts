import {angle, magnitude, over, times, complex} from './complex';
import {linearTensionAfter} from './span';
import {frequencyResponse} from './state-space';
import {stepResponse} from './step-response';
import {
  effectiveStiffnessN,
  outputToMeasured,
  torqueResponse,
  torqueToTension,
  unwindMode,
  type UnwindPoint,
} from './unwind-plant';

const POINT: UnwindPoint = {
  radiusM: 0.25,
  inertiaKgM2: 5.3009,
  stiffnessN: 4e5,
  spanM: 2,
  lineMps: 2,
  tensionN: 200,
  woundTensionN: 100,
  lossTimeS: 0.005,
  viscousNmS: 0.05,
};

describe('the linear unwind', () => {
  it('is the same as transfer function, as state space and as oscillator', () => {
    const {gainNPerNm, naturalRadps, dampingFactor} = unwindMode(POINT);
    for (const radps of [0, 1, 10, 48.6, 200]) {
      const expected = torqueResponse(POINT, radps);
      const inStates = frequencyResponse(torqueToTension(POINT), radps);
      const ratio = radps / naturalRadps;
      const oscillator = over(
        times(complex(gainNPerNm), complex(1, POINT.lossTimeS * radps)),
        complex(1 - ratio * ratio, 2 * dampingFactor * ratio),
      );
      for (const each of [inStates, oscillator])
        expect(magnitude(over(each, expected)) - 1).toBeCloseTo(0, 12);
      for (const each of [inStates, oscillator])
        expect(angle(over(each, expected))).toBeCloseTo(0, 12);
    }
  });

  // the project's handbook, section 0.4: REF-A at several radii without bearing drag and strain (Python)
  for (const [radiusM, inertiaKgM2, naturalRadps, dampingFactor] of [
    [0.5, 78.932, 25.17, 0.0828],
    [0.25, 5.3009, 48.55, 0.1318],
    [0.1, 0.5178, 62.14, 0.1642],
    [0.06, 0.4084, 41.98, 0.1183],
    [0.05, 0.4, 35.35, 0.1043],
  ] as const)
    it(`swings as the handbook's table says at R ${radiusM} m`, () => {
      const free = {radiusM, inertiaKgM2, tensionN: 0, woundTensionN: 0, viscousNmS: 0.05};
      const mode = unwindMode({...POINT, ...free});

      expect(Math.abs(mode.naturalRadps / naturalRadps - 1)).toBeLessThan(3e-4);
      expect(Math.abs(mode.dampingFactor / dampingFactor - 1)).toBeLessThan(2e-3);
    });

  it('answers a step of torque with 1/R in the end', () => {
    const response = stepResponse(torqueToTension({...POINT, viscousNmS: 0}), 0.05, 200);

    expect(response[0]).toBe(0);
    expect(response.at(-1)).toBeCloseTo(4, 6);
  });

  it('shows the cell what the web pulls, later', () => {
    const chain = {torquePerPct: 2.5, lagS: 0.1, filterS: 0.05};
    const whole = outputToMeasured(POINT, chain);
    const radps = 7;
    const measured = frequencyResponse(whole, radps, 0);
    const tension = frequencyResponse(whole, radps, 1);

    const filter = over(complex(1), complex(1, 0.05 * radps));
    const brake = over(complex(2.5), complex(1, 0.1 * radps));
    expect(magnitude(over(measured, times(tension, filter)))).toBeCloseTo(1, 12);
    expect(magnitude(over(tension, times(brake, torqueResponse(POINT, radps))))).toBeCloseTo(1, 12);
    // without filter the cell sees the tension itself
    const direct = outputToMeasured(POINT, {...chain, filterS: 0});
    expect(frequencyResponse(direct, radps, 0)).toEqual(frequencyResponse(direct, radps, 1));
  });

  it('is EA − T₁ in the first order of the wound-in strain', () => {
    const slack = {...POINT, tensionN: 0};

    expect(effectiveStiffnessN(slack) / (4e5 - 100)).toBeCloseTo(1, 6);
    expect(effectiveStiffnessN(POINT) / 4e5).toBeCloseTo(1 + 2 * 5e-4 - 2.5e-4, 6);
  });
});

describe('the linear span', () => {
  it('fills without end while nothing leaves', () => {
    const point = {stiffnessN: 4e5, spanM: 2, enteringN: 0, enteringMps: -0.001, leavingMps: 0};

    // 1 mm/s of stretch: 200 N a second
    expect(linearTensionAfter(point, 50, 2)).toBeCloseTo(450, 9);
  });
});
