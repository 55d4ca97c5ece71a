import {
  aliasHz,
  firstOrderLag,
  sampled,
  seriesToStandard,
  standardToParallel,
  standardToSeries,
  parallelToStandard,
} from '../analysis/index';
import {aClosedPid, runLoop} from '../test-support/a-pid';
import {amplitudeOf} from '../test-support/curves';
import {plainRefA} from '../test-support/ref-a';
import {record} from '../test-support/record';
import {near} from '../test-support/within';

// Numbers of table M of the project's handbook; A: closed form, P: worked out in Python.
describe('forms of the controller', () => {
  it('series 2, 10, 2 is standard 2.4, 12, 1.66667 and back (handbook M 41; A)', () => {
    const standard = seriesToStandard({gain: 2, integralS: 10, derivativeS: 2});
    const back = standardToSeries(standard)!;

    expect(standard.gain).toEqual(near(2.4, 1e-6));
    expect(standard.integralS).toEqual(near(12, 1e-6));
    expect(standard.derivativeS).toEqual(near(5 / 3, 1e-6));
    expect(back.gain).toEqual(near(2, 1e-6));
    expect(back.integralS).toEqual(near(10, 1e-6));
    expect(back.derivativeS).toEqual(near(2, 1e-6));
    expect(parallelToStandard(standardToParallel(standard))).toEqual(standard);
  });
});

describe('the sampled controller', () => {
  const SECTION_F3 = {
    sampleS: 0.1,
    gain: 2,
    tiS: 10,
    tdS: 1,
    setPointWeight: 0.8,
    trackingS: Math.sqrt(10),
    integralPct: 50,
  };

  it('puts out 66.00, 66.20, 54.40, 47.58, 55.24, 59.15 (handbook M 42; P, section F.3)', () => {
    const pid = aClosedPid(SECTION_F3);

    [
      [0, 66],
      [0, 66.2],
      [1, 54.4],
      [2, 47.58],
      [2, 55.24],
      [2, 59.15],
    ].forEach(([measured, output]) => {
      expect(pid.tick(10, measured!)).toEqual(near(output!, 1e-6));
    });
  });

  it('calculates back from its limit: 146.000000 … 145.028715 (handbook M 43; P, section F.4)', () => {
    const pid = aClosedPid(SECTION_F3);

    for (const wanted of [146, 145.745352, 145.498757, 145.25996, 145.028715]) {
      // before its limit: P = Kc·b·r = 96, no D, and the integral of the tick before
      expect(96 + pid.integralPct()!).toEqual(near(wanted, 1e-6));
      expect(pid.tick(60, 0)).toBe(100);
    }
  });

  it('leaves 14.286 % of a step to a P controller, K 2, Kc 3 (handbook M 75; A)', () => {
    const loop = {process: firstOrderLag(2, 10), deadTimeS: 0, gain: 3, tiS: 0, setPoint: 1};
    const {y} = runLoop({...loop, sampleS: 0.01, lengthS: 30});

    expect(100 * (1 - y.at(-1)!)).toEqual(near(14.286, 0.01));
  });

  it('sees 6.3662 Hz at 10 samples a second as 3.634 Hz (handbook M 80; A)', () => {
    expect(aliasHz(6.3662, 10)).toEqual(near(3.634, 0.01));

    // the engine: a roll that turns 6.3662 times a second, out of round, seen in ticks of 0.1 s for 100 s
    const speedMps = 2 * Math.PI * 0.5 * 6.3662;
    const {at, column} = record(
      plainRefA({
        roll: {woundTensionN: 200, eccentricityM: 1e-5},
        controller: {sampleS: 0.1},
        line: [{atS: 0, command: 'run', speedMps, rampS: 100}],
      }),
      220,
    );
    const seen = column('tensionN').slice(-1000);
    const amplitudes = Array.from({length: 499}, (_, i) => amplitudeOf(seen, i + 1));
    const strongest = amplitudes.indexOf(Math.max(...amplitudes)) + 1;

    expect(at(220, 'rollRadps') / (2 * Math.PI)).toEqual(near(6.3662, 2e-3));
    expect(strongest / 100).toEqual(near(3.634, 0.01));
  });

  it('meets a lag of 0.1 s in ticks of 10 ms as a = 0.904837 (handbook M 81; A)', () => {
    const {a, b} = sampled(firstOrderLag(1, 0.1), 0.01);

    expect(a.get(0, 0)).toEqual(near(0.904837, 1e-6));
    expect(b.get(0, 0)).toEqual(near(1 - 0.904837, 1e-6));
  });
});
