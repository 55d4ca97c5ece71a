import * as at from './controller-state';
import {pidOutput} from './pid';
import * as seen from './seen';
import * as set from './tuning';

interface Given {
  readonly kp?: number;
  readonly tiS?: number;
  readonly tdS?: number;
  readonly weight?: number;
  readonly windup?: number;
  readonly dancer?: boolean;
}

/** A PID with 10 ms, output 20 % in force, and a way to give it ticks. */
function aPid({kp = 2, tiS = 0, tdS = 0, weight = 1, windup = set.CONDITIONAL, dancer}: Given) {
  const state = new Float64Array(at.CONTROLLER_SIZE);
  const tuning = new Float64Array(set.TUNING_SIZE);
  const news = new Float64Array(seen.SEEN_SIZE);
  tuning[set.SAMPLE_S] = 0.01;
  tuning[set.TI] = tiS;
  tuning[set.TD] = tdS;
  tuning[set.DERIVATIVE_N] = 10;
  tuning[set.WEIGHT] = weight;
  tuning[set.OUT_MAX] = 100;
  tuning[set.WINDUP] = windup;
  tuning[set.TRACKING_S] = 0.5;
  tuning[set.IS_BUMPLESS] = 1;
  news[seen.GAIN] = kp;
  news[seen.COMPENSATION] = 1;
  news[seen.SENSE] = dancer === true ? -1 : 1;
  state[at.OUTPUT] = 20;
  const tick = (r: number, y: number): number => {
    news[seen.R] = r;
    news[seen.Y] = y;
    return (state[at.OUTPUT] = pidOutput(state, tuning, news));
  };
  return {state, tuning, news, tick};
}

// Expected values by hand from the standard form c = Kp·(b·r − y) + I − Kp·Td·d.
describe('pidOutput', () => {
  it('closes the loop at the output in force', () => {
    expect(aPid({tiS: 1}).tick(30, 10)).toBeCloseTo(20, 12);
    expect(aPid({tiS: 1, dancer: true}).tick(50, 70)).toBeCloseTo(20, 12);
  });

  it('answers an error by gain, and by gain over the integral time each tick', () => {
    const pid = aPid({kp: 2, tiS: 0.5});
    pid.tick(30, 30);

    expect(pid.tick(31, 30)).toBeCloseTo(22, 12);
    expect(pid.tick(31, 30)).toBeCloseTo(22 + (2 * 0.01) / 0.5, 12);
  });

  it('weighs the set point in the proportional part only', () => {
    const pid = aPid({kp: 2, weight: 0.5});
    pid.tick(30, 30);

    expect(pid.tick(32, 30)).toBeCloseTo(22, 12);
    expect(pid.tick(32, 31)).toBeCloseTo(20, 12);
  });

  it('keeps I as a bias without integral time', () => {
    const pid = aPid({kp: 1});
    pid.tick(30, 30);
    for (let i = 0; i < 100; i++) pid.tick(35, 30);

    expect(pid.state[at.OUTPUT]).toBeCloseTo(25, 12);
  });

  it('acts on the change of the measurement through its filter, not on the set point', () => {
    const pid = aPid({kp: 1, tdS: 0.2});
    pid.tick(30, 30);

    expect(pid.tick(30, 31)).toBeCloseTo(20 - 1 - (0.2 * 1) / (0.02 + 0.01), 12);
    const before = pid.state[at.DERIVATIVE]!;
    pid.tick(99, 31);
    expect(pid.state[at.DERIVATIVE]).toBeCloseTo((before * 0.02) / 0.03, 12);
  });

  it('asks a dancer that rises for more brake', () => {
    const pid = aPid({kp: 2, dancer: true});
    pid.tick(50, 50);

    expect(pid.tick(50, 52)).toBeCloseTo(24, 12);
  });

  it('adds compensation to the whole of it and the assist after that', () => {
    const pid = aPid({kp: 2});
    pid.news[seen.COMPENSATION] = 0.5;
    pid.news[seen.ASSIST_PCT] = 3;
    pid.tick(30, 30);

    expect(pid.state[at.OUTPUT]).toBeCloseTo(20, 12);
    expect(pid.tick(31, 30)).toBeCloseTo(21, 12);
  });
});

describe('anti-windup', () => {
  const pushed = (windup: number): number => {
    const pid = aPid({kp: 1, tiS: 1, windup});
    pid.tick(30, 30);
    for (let i = 0; i < 300; i++) pid.tick(95, 0);
    return pid.state[at.INTEGRAL]!;
  };

  it('conditional: I rests while the output is at its limit', () => {
    // from 20: I grows by 0.95 a tick until c reaches 100 with 95 from the proportional part
    expect(pushed(set.CONDITIONAL)).toBeCloseTo(20, 1);
  });

  it('none: I goes on growing', () => {
    expect(pushed(set.NO_ANTI_WINDUP)).toBeCloseTo(20 + 300 * 0.95, 6);
  });

  it('back-calculation: I settles where its two parts cancel', () => {
    // Kp·Ts/Ti·e = Ts/Tt·(c − u): c − u = 95·0.5, I = c − 95 = 100 + 47.5 − 95
    expect(pushed(set.BACK_CALCULATION)).toBeCloseTo(52.5, 0);
  });

  it('says at which limit the output is', () => {
    const pid = aPid({kp: 10});
    pid.tick(30, 30);
    pid.tick(90, 0);
    expect(pid.state[at.LIMIT]).toBe(1);
    pid.tick(0, 90);
    expect(pid.state[at.LIMIT]).toBe(-1);
    pid.tick(30, 30);
    expect(pid.state[at.LIMIT]).toBe(0);
  });
});
