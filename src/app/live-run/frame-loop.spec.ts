import {type Driven, FrameLoop} from './frame-loop';
import {FramesByHand} from './test-support/plant-here';

describe('FrameLoop', () => {
  let frames: FramesByHand;
  let asked: number[];
  let answer: () => void;
  let drawn: number;

  function aLoop(driven: Partial<Driven> = {}): FrameLoop {
    const loop = new FrameLoop(
      {
        sampleS: 0.01,
        advance: (ticks) => {
          asked.push(ticks);
          return Promise.resolve();
        },
        ...driven,
      },
      () => drawn++,
      frames,
    );
    loop.start();
    return loop;
  }

  beforeEach(() => {
    frames = new FramesByHand();
    asked = [];
    drawn = 0;
  });

  it('asks for the ticks that are due and carries the rest over', async () => {
    aLoop();

    await frames.pass(16);
    await frames.pass(16);
    await frames.pass(16);

    expect(asked).toEqual([1, 2, 1]); // 1.6, 2.2, 1.8 ticks due
    expect(drawn).toBe(3);
  });

  it('asks for more ticks at a higher factor', async () => {
    aLoop().factor = 20;

    await frames.pass(16);

    expect(asked).toEqual([32]);
  });

  it('lets go what is more than 250 ms behind', async () => {
    aLoop();

    await frames.pass(5000);

    expect(asked).toEqual([25]);
  });

  it('has one request in flight and draws all the same', async () => {
    aLoop({
      advance: (ticks) => {
        asked.push(ticks);
        return new Promise((resolve) => (answer = resolve));
      },
    });

    await frames.pass(20);
    await frames.pass(20);
    expect(asked).toEqual([2]);

    answer();
    await frames.pass(0);
    await frames.pass(20);

    expect(asked.length).toBe(2);
    expect(drawn).toBe(4);
  });

  it('asks for nothing once stopped', async () => {
    const loop = aLoop();

    loop.stop();
    await frames.pass(100);

    expect(asked).toEqual([]);
    expect(loop.isRunning).toBeFalse();
  });
});
