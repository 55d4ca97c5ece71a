import {type LogEntry, replay} from '#sim-core/index';
import {LiveRun, type Recorder} from './live-run';
import {openPlant, type PlantLink} from './plant/plant-link';
import {aStand, FramesByHand, plantHere} from './test-support/plant-here';

describe('LiveRun', () => {
  let frames: FramesByHand;
  let run: LiveRun;

  function aRun(record?: Recorder, open: () => PlantLink = plantHere): LiveRun {
    frames = new FramesByHand();
    run = new LiveRun(record, open, frames);
    return run;
  }

  afterEach(() => run.close());

  it('stands still until it is resumed', async () => {
    aRun();

    await run.start({document: aStand()});
    await frames.pass(100);
    expect(run.trace.count).toBe(0);
    expect(run.pauseReason()).toBe('notStarted');

    run.resume();
    await frames.pass(100);
    expect(run.trace.count).toBe(10);
    expect(run.pauseReason()).toBeNull();
  });

  it('shows an act only after it is recorded', async () => {
    let keep: () => void = () => undefined;
    const seen: LogEntry[] = [];
    aRun((entry) => {
      seen.push(entry);
      return new Promise((resolve) => (keep = resolve));
    });
    await run.start({document: aStand()});

    const acted = run.act({set: {kp: 0.4}});
    await new Promise((resolve) => setTimeout(resolve));
    expect(seen.map(({n}) => n)).toEqual([1]);
    expect(run.entries()).toEqual([]);

    keep();
    await acted;
    expect(run.entries().length).toBe(1);
    expect(run.settings()['kp']).toBe(0.4);
  });

  it('records acts in the order of their numbers, whatever the recorder takes', async () => {
    const recorded: number[] = [];
    aRun(async ({n}) => {
      await new Promise((resolve) => setTimeout(resolve, n === 1 ? 20 : 0));
      recorded.push(n);
    });
    await run.start({document: aStand()});

    await Promise.all([
      run.act({set: {kp: 0.3}}),
      run.act({set: {kp: 0.4}}),
      run.note({kind: 'pause'}),
    ]);

    expect(recorded).toEqual([1, 2, 3]);
  });

  it('tells why an act was refused and goes on', async () => {
    aRun();
    await run.start({document: aStand()});

    const entry = await run.act({set: {kp: -1}});

    expect(entry).toBeNull();
    expect(run.faults()[0]?.path).toContain('kp');
    expect(run.entries()).toEqual([]);
    expect(await run.act({set: {kp: 0.5}})).not.toBeNull();
    expect(run.faults()).toEqual([]);
  });

  it('takes a log up to the same fingerprint, paused', async () => {
    aRun();
    await run.start({document: aStand()});
    await run.act({line: {command: 'run', speedMps: 2, rampS: 3}});
    await run.advance(500);
    await run.act({set: {kp: 0.35}});
    await run.advance(400);
    const hash = await run.hash();
    const entries = run.entries();
    run.close();

    aRun();
    await run.start({document: aStand(), entries, throughTick: 900});

    expect(await run.hash()).toBe(hash);
    expect(run.trace.count).toBe(900);
    expect(run.pauseReason()).toBe('notStarted');
    expect(run.events().some(({phase}) => phase === 'running')).toBeTrue();
    expect(replay(aStand(), entries, 900).hash()).toBe(hash!);
  });

  it('ends when the web breaks and does not go on', async () => {
    aRun();
    await run.start({document: aStand({standstillPct: 95, startRampS: 0, kp: 5})});
    run.resume();

    await run.act({line: {command: 'run', speedMps: 5, rampS: 0.2}});
    await run.advance(2000);
    run.resume();

    expect(run.outcome().kind).toBe('webBroke');
    expect(run.pauseReason()).toBe('over');
  });

  it('goes no further than its time limit, also when the fastest frame asks for more', async () => {
    aRun();
    await run.start({document: aStand(), limitS: 1});
    run.setFactor(20);
    run.resume();

    await frames.pass(200);
    await frames.pass(200);

    expect(run.trace.count).toBe(100);
    expect(run.view?.tS).toBe(1);
  });

  it('calls back at each frame until it is told to stop', async () => {
    aRun();
    await run.start({document: aStand()});
    const ticks: number[] = [];
    const stop = run.onFrame(({tick}) => ticks.push(tick));
    run.resume();

    await frames.pass(20);
    await frames.pass(20);
    stop();
    await frames.pass(20);

    expect(ticks.length).toBe(3); // at once, then two frames
    expect(ticks.at(-1)).toBeGreaterThan(0);
  });

  it('publishes read-outs five times a second, not at each frame', async () => {
    aRun();
    await run.start({document: aStand()});
    run.resume();
    const seen = new Set<unknown>();

    for (let frame = 0; frame < 60; frame++) {
      await frames.pass(1000 / 60);
      seen.add(run.readOuts());
    }

    expect(seen.size).toBeGreaterThanOrEqual(4);
    expect(seen.size).toBeLessThanOrEqual(7);
  });

  it('gives the same fingerprint from a worker of its own', async () => {
    aRun(undefined, openPlant);
    await run.start({document: aStand()});
    await run.act({line: {command: 'run', speedMps: 2, rampS: 3}});
    await run.advance(700);

    const hash = await run.hash();

    expect(hash).toBe(replay(aStand(), run.entries(), 700).hash());
    expect(run.trace.count).toBe(700);
    expect(run.view?.lineMps).toBeCloseTo(2, 6);
  });
});
