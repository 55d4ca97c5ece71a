import {type LineCommand} from '../scenario/scenario';
import {Line} from './line';

const SAMPLE_S = 0.01;

function aLine(roundS: number): Line {
  const line = new Line(new Float64Array(Line.size(roundS, SAMPLE_S)));
  line.reset(roundS);
  return line;
}

/** Greatest difference between the pieces of each tick and the speed looked up, over 20 s. */
function worstPiece(line: Line, commands: readonly (readonly [number, LineCommand])[]): number {
  let worst = 0;
  for (let tick = 0; tick < 2000; tick++) {
    const t = tick * SAMPLE_S;
    for (const [at, command] of commands) if (at === tick) line.command(t, command);
    line.openTick(t, SAMPLE_S);
    for (let piece = 0; piece < line.pieces; piece++) {
      const from = line.starts[piece]!;
      const half = (line.ends[piece]! - from) / 2;
      const laid = line.c0[piece]! + half * (line.c1[piece]! + half * line.c2[piece]!);
      worst = Math.max(worst, Math.abs(laid - line.speedAt(t + from + half)));
    }
  }
  return worst;
}

describe('Line', () => {
  it('stands before the first run', () => {
    const line = aLine(1);
    line.command(0, {command: 'stop', rampS: 5});

    expect(line.stands(0)).toBeTrue();
    expect(line.speedAt(0)).toBe(0);
  });

  it('ramps straight without rounding', () => {
    const line = aLine(0);
    line.command(1, {command: 'run', speedMps: 4, rampS: 8});

    expect(line.speedAt(3)).toBeCloseTo(1, 12);
    expect(line.speedAt(9)).toBe(4);
  });

  it('has rounded ends, the same steepest slope and a ramp longer by the rounding', () => {
    // closed form: the mean of a ramp a·t over the last s is a·t²/(2s) for t < s, then a·(t − s/2)
    const line = aLine(1);
    line.command(2, {command: 'run', speedMps: 4, rampS: 8});

    expect(line.speedAt(2.5)).toBeCloseTo((0.5 * 0.5 * 0.5) / 2, 12);
    expect(line.speedAt(6)).toBeCloseTo(0.5 * 3.5, 12);
    expect(line.speedAt(10.5)).toBeCloseTo(4 - 0.0625, 12);
    expect(line.speedAt(11)).toBe(4);
  });

  it('rounds a jump to a straight ramp', () => {
    const line = aLine(2);
    line.command(1, {command: 'run', speedMps: 3, rampS: 0});

    expect(line.speedAt(2)).toBeCloseTo(1.5, 12);
    expect(line.speedAt(3)).toBe(3);
  });

  it('stands again when ramp and rounding of a stop are over', () => {
    const line = aLine(0.5);
    line.command(0, {command: 'run', speedMps: 3, rampS: 1});
    line.command(5, {command: 'stop', rampS: 2});

    expect(line.stands(7.49)).toBeFalse();
    expect(line.stands(7.5)).toBeTrue();
    expect(line.speedAt(7.5)).toBe(0);
  });

  it('takes a new command from the speed it has', () => {
    const line = aLine(0);
    line.command(0, {command: 'run', speedMps: 4, rampS: 4});
    line.command(2, {command: 'fastStop', rampS: 1});

    expect(line.speedAt(2)).toBe(2);
    expect(line.speedAt(2.5)).toBeCloseTo(1, 12);
    expect(line.speedAt(4)).toBe(0);
  });

  it('lays each tick out in pieces that are the speed, with ramps that end between ticks', () => {
    const run = (speedMps: number, rampS: number): LineCommand => ({
      command: 'run',
      speedMps,
      rampS,
    });
    const commands = [
      [0, run(3, 1.2345)],
      [90, run(1, 0)],
      [150, run(5, 0.0041)],
      [151, {command: 'stop', rampS: 3.3337}],
      [700, run(2, 6.7)],
      [702, run(4, 0.5)],
    ] as const;

    expect(worstPiece(aLine(1.0007), commands)).toBeLessThan(1e-12);
    expect(worstPiece(aLine(0), commands)).toBeLessThan(1e-12);
  });
});
