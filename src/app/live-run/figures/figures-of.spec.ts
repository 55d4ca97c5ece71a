import {replay, startRun, TraceBlock} from '#sim-core/index';
import {aStand} from '../test-support/plant-here';
import {figuresOf, lastAct} from './figures-of';

const YARDSTICK = {targetN: 200, toleranceN: 20, lowestPct: 0, highestPct: 100};

describe('figuresOf', () => {
  function aStartedAndStoppedRun() {
    const run = startRun(aStand());
    run.act({line: {command: 'run', speedMps: 2, rampS: 5}});
    run.advance(1500);
    const stop = run.act({line: {command: 'stop', rampS: 4}});
    const entries = [
      {n: 1, tick: 0, kind: 'line', line: {command: 'run', speedMps: 2, rampS: 5}} as const,
      stop,
    ];
    const block = new TraceBlock(3000);
    replay(aStand(), entries, 3000, block);
    return {entries, block};
  }

  it('counts from the last act', () => {
    const {entries, block} = aStartedAndStoppedRun();

    const since = lastAct(entries);
    const figures = figuresOf(block, since, YARDSTICK, 'si');

    let peakN = 0;
    for (let row = 1500; row < 3000; row++) peakN = Math.max(peakN, block.at(row, 'tensionN'));
    expect(since?.tick).toBe(1500);
    expect(figures.find(({name}) => name === 'Peak')?.number).toBe(peakN.toFixed(0));
  });

  it('shows the tension at rest after a stop only', () => {
    const {entries, block} = aStartedAndStoppedRun();
    const names = (count: number): string[] =>
      figuresOf(block, lastAct(entries.slice(0, count)), YARDSTICK, 'si').map(({name}) => name);

    expect(names(1)).not.toContain('Tension at rest');
    expect(names(2)).toContain('Tension at rest');
  });

  it('says "not yet" while the target is not reached', () => {
    const {block} = aStartedAndStoppedRun();

    const figures = figuresOf(block, null, {...YARDSTICK, targetN: 400}, 'si');

    const onTarget = figures.find(({name}) => name === 'On target by');
    expect(onTarget?.number).toBe('not yet');
    expect(onTarget?.isOut).toBeTrue();
  });

  it('ignores pauses when it looks for the last act', () => {
    expect(lastAct([{n: 1, tick: 5, kind: 'pause'}])).toBeNull();
  });
});
