import {Plant} from '../plant/plant';
import {ScenarioError} from '../scenario/faults';
import {aDancerScenario, aScenario} from '../test-support/a-scenario';
import {live, LIVELY} from '../test-support/a-live-log';
import {type LogEntry} from './log';
import {asScenario, replay, startRun} from './replay';
import {TraceBlock} from './trace';

const LENGTH = 1600;

function hashOf(document: unknown, stride: number, block?: TraceBlock): string {
  const run = startRun(document);
  while (run.tick < LENGTH) run.advance(Math.min(stride, LENGTH - run.tick), block);
  return run.hash();
}

describe('a run', () => {
  for (const [name, document] of [
    ['with a load cell', LIVELY],
    ['with a dancer', aDancerScenario({lineRoundS: 0.3, span: {lengthM: 3, rollerRunoutM: 1e-4}})],
    ['at 20 ms with dead time', aScenario({controller: {sampleS: 0.02}, brake: {deadTimeS: 0.03}})],
  ] as const)
    it(`${name} has the same bits however many ticks a call runs, with rows or without`, () => {
      const whole = hashOf(document, LENGTH);

      expect(hashOf(document, 1)).toBe(whole);
      expect(hashOf(document, 37)).toBe(whole);
      expect(hashOf(document, 500, new TraceBlock(LENGTH))).toBe(whole);
    });

  it('goes on from a save, also in another run of the document', () => {
    const run = startRun(LIVELY);
    run.advance(700);
    run.act({set: {kp: 0.2}});
    const saved = run.save();
    run.advance(600);
    const events = [...run.events];
    const hash = run.hash();
    run.advance(100);

    run.load(saved);
    run.advance(600);
    expect(run.hash()).toBe(hash);
    expect(run.events).toEqual(events);

    const other = startRun(LIVELY);
    other.advance(33);
    other.load(saved);
    expect(other.act({set: {kp: 0.2}}).n).toBe(2);
  });

  it('goes on from a save after the web has parted', () => {
    const run = startRun(aScenario({web: {breakNPerM: 250}, controller: {standstillPct: 100}}));
    const saved = run.save();
    run.advance(1000);
    const {outcome} = run;
    expect(outcome.kind).toBe('webBroke');

    run.load(saved);
    expect(run.outcome.kind).toBe('running');
    run.advance(1000);
    expect(run.outcome).toEqual(outcome);
  });

  it('stops when its block is full', () => {
    const run = startRun(LIVELY);

    expect(run.advance(50, new TraceBlock(20))).toBe(20);
    expect(run.tick).toBe(20);
  });
});

describe('replay', () => {
  it('gives the bits that were lived', () => {
    const {run, log, throughTick} = live();
    const again = replay(LIVELY, log, throughTick);

    expect(again.hash()).toBe(run.hash());
    expect(again.events).toEqual(run.events);
    expect(again.view()).toEqual(run.view());
    expect(live(1).run.hash()).toBe(run.hash());
  });

  it('can go on, counting its entries on', () => {
    const {run, log} = live();
    const again = replay(LIVELY, log, 1600);

    expect(again.act({set: {kp: 0.3}})).toEqual({
      n: log.length + 1,
      tick: 1600,
      kind: 'set',
      set: {kp: 0.3},
    });
    run.act({set: {kp: 0.3}});
    run.advance(50);
    again.advance(50);
    expect(again.hash()).toBe(run.hash());
  });

  it('gives other bits when any entry the engine feels moves by one tick', () => {
    const {run, log, throughTick} = live();
    const felt = log.filter(({kind}) => kind === 'set' || kind === 'line' || kind === 'disturb');

    for (const {n} of felt) {
      const later = log.map((entry) => ({...entry, tick: entry.tick + (entry.n >= n ? 1 : 0)}));
      const moved = later.map((entry) => (entry.n > n ? log[entry.n - 1]! : entry));
      const falls = moved.some(({tick}, place) => place > 0 && tick < moved[place - 1]!.tick);
      const tried = falls ? later : moved;
      expect(replay(LIVELY, tried, throughTick + 1).hash())
        .withContext(`entry ${n}`)
        .not.toBe(run.hash());
    }
    run.advance(1);
    expect(replay(LIVELY, log, throughTick + 1).hash()).toBe(run.hash());
  });

  it('can be written as one document that runs to the same bits', () => {
    const {run, log} = live();
    const whole = startRun(asScenario(LIVELY, log));
    whole.advance(1600);

    expect(whole.hash()).toBe(run.hash());
  });

  const {log} = live();
  const wrong: readonly (readonly [why: string, entries: unknown[], path: string])[] = [
    ['a gap in n', log.filter(({n}) => n !== 3), 'entries[2].n'],
    ['a falling tick', log.map((e) => (e.n === 5 ? {...e, tick: 10} : e)), 'entries[4].tick'],
    ['a tick that is not whole', [{...log[0]!, tick: 1.5}], 'entries[0].tick'],
    [
      'a tick beyond the end',
      log.map((e) => (e.n === 12 ? {...e, tick: 1601} : e)),
      'entries[11].tick',
    ],
    ['an unknown kind', [{n: 1, tick: 0, kind: 'dance'}], 'entries[0].kind'],
    ['no object', [null], 'entries[0]'],
    ['a value out of range', [{n: 1, tick: 0, kind: 'set', set: {kp: -1}}], 'entries[0].set.kp'],
    [
      'an unknown key',
      [{n: 1, tick: 0, kind: 'set', set: {sampleS: 0.1}}],
      'entries[0].set.sampleS',
    ],
    [
      'limits the wrong way round',
      [{n: 1, tick: 0, kind: 'set', set: {outMaxPct: 0}}],
      'entries[0].set.outMaxPct',
    ],
    [
      'a disturbance of nothing',
      [{n: 1, tick: 0, kind: 'disturb', disturb: {}}],
      'entries[0].disturb',
    ],
    [
      'a line command without speed',
      [{n: 1, tick: 0, kind: 'line', line: {command: 'run', rampS: 1}}],
      'entries[0].line.speedMps',
    ],
  ];
  for (const [why, entries, path] of wrong)
    it(`refuses ${why}`, () => {
      try {
        replay(LIVELY, entries as LogEntry[], 1600);
        fail('nothing was refused');
      } catch (error) {
        expect(error).toBeInstanceOf(ScenarioError);
        expect((error as ScenarioError).faults.map((fault) => fault.path)).toContain(path);
      }
    });

  it('refuses an end that is no tick and a block without room', () => {
    expect(() => replay(LIVELY, [], 1.5)).toThrowError(ScenarioError);
    expect(() => replay(LIVELY, [], 100, new TraceBlock(99))).toThrowError(RangeError);
  });
});

describe('acts', () => {
  it('are refused when the document would later fall out with them', () => {
    const run = startRun(aScenario({actions: [{atS: 2, set: {outMinPct: 50}}]}));

    expect(() => run.act({set: {outMaxPct: 45}})).toThrowError(ScenarioError);
    expect(run.act({set: {outMaxPct: 60}}).n).toBe(1);
  });

  it('are refused together with those already taken for the tick', () => {
    const run = startRun(aScenario({web: {lossTimeS: 0.1}}));
    run.act({set: {outMinPct: 40}});

    expect(() => run.act({set: {outMaxPct: 40}})).toThrowError(/outMaxPct/);
    expect(() => run.act({disturb: {modulusPa: 1e12}})).toThrowError(/slower than/);
  });

  it('take an optional key off with null and leave the others', () => {
    const run = startRun(aScenario({controller: {startOutputPct: 10}}));
    run.act({set: {startOutputPct: null}});
    run.advance(1);

    expect(run.settings()['startOutputPct']).toBeNull();
    expect(() => run.act({set: {kp: null as unknown as number}})).toThrowError(/kp/);
  });

  it('show in settings from the tick they act in', () => {
    const run = startRun(aScenario());
    expect(run.settings()).toEqual(
      jasmine.objectContaining({kp: 0.1, antiWindup: 'conditional', trackingS: null}),
    );
    run.act({set: {kp: 0.2}});
    expect(run.settings()['kp']).toBe(0.1);
    run.advance(1);
    expect(run.settings()['kp']).toBe(0.2);
  });
});

describe('what JSON cannot carry', () => {
  it('is not felt: a run with −0 is the run of the document that was stored', () => {
    const lived = startRun(aScenario({roll: {ovalM: -0}, controller: {manualPct: -0}}));
    lived.act({set: {mode: 'manual', manualPct: -0}});
    lived.advance(300);
    const stored = startRun(aScenario({roll: {ovalM: 0}, controller: {manualPct: 0}}));
    stored.act({set: {mode: 'manual', manualPct: 0}});
    stored.advance(300);

    expect(lived.hash()).toBe(stored.hash());
  });
});

describe('settings that no loop stands', () => {
  it('are refused by name: an integral time next to nothing, a tracking time below half a tick', () => {
    expect(() => startRun(aScenario({controller: {tiS: 1e-310}}))).toThrowError(/controller\.tiS/);
    const tracking = {antiWindup: 'backCalculation', trackingS: 0.004} as const;

    expect(() => startRun(aScenario({controller: tracking}))).toThrowError(/trackingS/);
    expect(() => startRun(aScenario()).act({set: tracking})).toThrowError(/set\.trackingS/);
  });
});

describe('a roll of thick web that runs out within one step', () => {
  it('is empty, not lost in numbers', () => {
    const run = startRun(
      aScenario({
        web: {thicknessM: 0.05, modulusPa: 1e6, densityKgM3: 1, breakNPerM: 1e7},
        roll: {coreRadiusM: 0.005, radiusM: 5},
        line: [{atS: 0.1, command: 'run', speedMps: 50, rampS: 0}],
        actions: [{atS: 1.72, disturb: {radiusM: 0.00501}}],
      }),
    );
    run.advance(400);

    expect(run.outcome.kind).toBe('rollEmpty');
  });
});

describe('a name', () => {
  it('is plain text: no null character, no half of a pair, as a database takes neither', () => {
    for (const name of ['a\0b', 'a\ud83db', '\udc00'])
      expect(() => startRun({...aScenario(), name})).toThrowError(/name/);

    expect(() => startRun({...aScenario(), name: 'Küche 5 – 🎯'})).not.toThrow();
  });
});

describe('a tick', () => {
  // a web that is just loose on a line that just creeps bends in every step, and each was halved to the last
  it('ends within a bounded number of steps', () => {
    const steps = Plant.prototype as unknown as {rungeKutta: () => void};
    const {rungeKutta} = steps;
    let count = 0;
    steps.rungeKutta = function (this: Plant): void {
      count++;
      rungeKutta.call(this);
    };
    const run = startRun(
      aScenario({
        initialTensionN: 0,
        line: [{atS: 0.2, command: 'run', speedMps: 1e-9, rampS: 1}],
      }),
    );
    run.advance(60);
    steps.rungeKutta = rungeKutta;

    expect(run.outcome.kind).toBe('running');
    expect(count).toBeGreaterThan(60);
    expect(count).toBeLessThan(60 * 4100);
  });
});
