import {type RunView} from '#sim-core/index';
import {curveLength, hang, tangent, type Wheel} from './geometry';
import {layoutFor} from './layout';
import {draw} from './web-drawing';

const SHAPE = {coreRadiusM: 0.05, fullRadiusM: 0.5, thicknessM: 1e-4};

function aView(view: Partial<RunView> = {}): RunView {
  return {
    tick: 0,
    tS: 0,
    phase: 'running',
    tensionN: 200,
    sampleN: 200,
    measuredN: 200,
    setPointN: 200,
    outputPct: 25,
    lineMps: 2,
    lineTargetMps: 2,
    rollRadps: 8,
    rollRad: 1,
    radiusM: 0.25,
    webLeftM: 1000,
    slackM: 0,
    torqueNm: 50,
    brakeC: 30,
    dancerM: 0,
    lineStands: false,
    ...view,
  };
}

describe('the tangent between two wheels', () => {
  const roll: Wheel = {x: 100, y: 100, r: 90, side: 'over'};
  const over: Wheel = {x: 400, y: 50, r: 12, side: 'over'};
  const under: Wheel = {x: 400, y: 150, r: 12, side: 'under'};

  for (const [name, other] of [
    ['over both', over],
    ['over one and under the other', under],
  ] as const) {
    it(`touches each at a right angle to its radius, ${name}`, () => {
      const {from, to} = tangent(roll, other);

      // closed form: distance from centre = radius, radius across the line
      expect(Math.hypot(from.x - roll.x, from.y - roll.y)).toBeCloseTo(roll.r, 9);
      expect(Math.hypot(to.x - other.x, to.y - other.y)).toBeCloseTo(other.r, 9);
      const line = {x: to.x - from.x, y: to.y - from.y};
      expect(line.x * (from.x - roll.x) + line.y * (from.y - roll.y)).toBeCloseTo(0, 6);
      expect(line.x * (to.x - other.x) + line.y * (to.y - other.y)).toBeCloseTo(0, 6);
      expect(from.y).toBeLessThan(roll.y);
      expect(Math.sign(to.y - other.y)).toBe(other === over ? -1 : 1);
    });
  }
});

describe('web that hangs', () => {
  const roll: Wheel = {x: 100, y: 100, r: 60, side: 'over'};
  const idler: Wheel = {x: 400, y: 60, r: 12, side: 'over'};

  for (const excess of [2, 20, 80]) {
    it(`is ${excess} px longer than the straight stretch`, () => {
      const loop = hang(roll, idler, excess);

      expect(loop.excess).toBeCloseTo(excess, 2);
      expect(loop.control.y).toBeGreaterThan(60);
    });
  }

  it('leaves the roll along its edge', () => {
    const {from, control} = hang(roll, idler, 40);

    const across =
      (control.x - from.x) * (from.x - roll.x) + (control.y - from.y) * (from.y - roll.y);
    const size = Math.hypot(control.x - from.x, control.y - from.y) * roll.r;
    expect(Math.abs(across / size)).toBeLessThan(0.02);
  });

  it('hangs lower the longer it is', () => {
    expect(hang(roll, idler, 80).control.y).toBeGreaterThan(hang(roll, idler, 20).control.y);
  });
});

describe('curveLength', () => {
  it('is the distance when the curve is straight', () => {
    expect(curveLength({x: 0, y: 0}, {x: 15, y: 20}, {x: 30, y: 40})).toBeCloseTo(50, 9);
  });
});

describe('draw', () => {
  const layout = layoutFor(1000);

  it('draws the roll to scale and turned as it is', () => {
    const drawn = draw(layout, SHAPE, aView({radiusM: 0.25, rollRad: Math.PI / 3}), false);

    expect(drawn.rollR / layout.fullRollR).toBeCloseTo(0.5, 9);
    expect(drawn.coreR / layout.fullRollR).toBeCloseTo(0.1, 9);
    expect(drawn.rollDeg).toBeCloseTo(60, 9);
  });

  it('keeps the brake within a large roll and around a small core', () => {
    const large = draw(layout, SHAPE, aView({radiusM: 0.5}), false);
    const small = draw(layout, SHAPE, aView({radiusM: 0.06}), false);

    expect(large.brakeR).toBeLessThan(large.rollR);
    expect(small.brakeR).toBeGreaterThan(small.coreR);
  });

  it('draws a tighter web thicker', () => {
    const tight = draw(layout, SHAPE, aView({tensionN: 200}), false);
    const loose = draw(layout, SHAPE, aView({tensionN: 20}), false);

    expect(tight.webWidth).toBeGreaterThan(loose.webWidth);
  });

  it('parts the web when it is broken, further down as its ends fall', () => {
    const whole = draw(layout, SHAPE, aView(), false);
    const torn = draw(layout, SHAPE, aView(), true, 0);
    const fallen = draw(layout, SHAPE, aView(), true, 1);

    expect(whole.web.match(/M/g)?.length).toBe(1);
    expect(fallen.web.match(/M/g)?.length).toBeGreaterThan(1);
    expect(fallen.web).not.toBe(torn.web);
  });

  it('lays a loop that is too long for the stand on the floor', () => {
    const {web} = draw(layout, SHAPE, aView({tensionN: 0, slackM: 3}), false);

    const [fromY, controlY, toY] = /^M\S+ (\S+) Q\S+ (\S+) \S+ (\S+)/
      .exec(web)!
      .slice(1)
      .map(Number);
    expect(fromY! / 4 + controlY! / 2 + toY! / 4).toBeLessThanOrEqual(layout.floor);
  });
});

describe('layoutFor', () => {
  for (const width of [300, 360, 700, 890, 1600]) {
    it(`keeps everything on a sheet of ${width} px`, () => {
      const {roll, fullRollR, nip, labels, end, floor, height, isNarrow} = layoutFor(width);

      expect(roll.x - fullRollR).toBeGreaterThanOrEqual(0);
      expect(roll.y + fullRollR).toBeLessThanOrEqual(floor);
      expect(nip.x + nip.r).toBeLessThan(end);
      expect(isNarrow).toBe(width < 700);
      for (const {x, y} of Object.values(labels)) {
        expect(x).toBeGreaterThanOrEqual(0);
        expect(x).toBeLessThanOrEqual(width);
        expect(y).toBeLessThanOrEqual(height - 17);
      }
    });
  }
});
