import {type Entry} from '#shared/attempts/attempt';
import {type Exercise} from '#shared/exercises/exercise';
import {type Problem} from '#shared/problem';
import {STOP_WITHOUT_A_LOOP} from '../../../demo/documents/stop-without-a-loop';
import {AppError} from '../../../errors';
import {checkBatch, type Standing} from './batch-rules';

// Control ticks of the exercise are 10 ms; 300 s are 30 000 of them.
const exercise: Exercise = {
  ...STOP_WITHOUT_A_LOOP,
  touch: {
    settings: [
      {key: 'kp', lowest: 0.05, highest: 0.5},
      {key: 'mode', choices: ['automatic', 'manual']},
      {key: 'radiusRefM'},
    ],
    commands: [
      {command: 'run', speedMps: [1, 2], rampS: [8, 8]},
      {command: 'run', speedMps: [0.2, 0.2], rampS: [2, 4]},
      {command: 'stop', rampS: [4, 6]},
    ],
  },
  limits: {simulatedS: 300, tries: null, entries: 20},
  time: {pause: 'free', factors: [1, 2, 20]},
};
const long: Standing = {lastEntry: 0, lastEntryTick: 0, elapsedS: 3600};

type Loose = {kind: Entry['kind']} & Record<string, unknown>;
const entry = (loose: Loose, n = 1, tick = 100): Entry => ({n, tick, ...loose}) as Entry;

function thrownBy(
  entries: Entry[],
  {throughTick = 1000, standing = long, of = exercise} = {},
): AppError | undefined {
  try {
    checkBatch({throughTick, entries}, of, standing);
    return undefined;
  } catch (error) {
    if (error instanceof AppError) return error; // what is tested
    throw error;
  }
}

const faultsOf = (error: AppError | undefined): Problem['errors'] => error?.details.errors ?? [];

describe('a batch', () => {
  describe('is refused for an entry', () => {
    const refused: [name: string, loose: Loose, path: string, message: RegExp][] = [
      ['with a locked key', {kind: 'set', set: {tiS: 1}}, 'set.tiS', /only kp, mode/],
      ['with an unknown key', {kind: 'set', set: {gain: 1}}, 'set.gain', /locked/],
      ['below its range', {kind: 'set', set: {kp: 0.04}}, 'set.kp', /0\.05 … 0\.5/],
      ['above its range', {kind: 'set', set: {kp: 0.51}}, 'set.kp', /0\.05 … 0\.5/],
      ['beyond the engine', {kind: 'set', set: {kp: 1001}}, 'set.kp', /0 … 1000/],
      ['with a wrong type', {kind: 'set', set: {kp: '0.2'}}, 'set.kp', /0 … 1000/],
      ['with no such choice', {kind: 'set', set: {mode: 'off'}}, 'set.mode', /automatic, manual/],
      ['with null for a number', {kind: 'set', set: {kp: null}}, 'set.kp', /0 … 1000/],
      ['that sets nothing', {kind: 'set', set: {}}, 'set', /at least one/],
      [
        'with an unknown command',
        {kind: 'line', line: {command: 'jog', rampS: 8}},
        'line.command',
        /run, stop, fastStop/,
      ],
      [
        'with a command that is not given',
        {kind: 'line', line: {command: 'fastStop', rampS: 4}},
        'line.command',
        /^Allowed: run, stop$/,
      ],
      [
        'with another speed',
        {kind: 'line', line: {command: 'run', speedMps: 2.1, rampS: 8}},
        'line',
        /speedMps 1 … 2, rampS 8, or run with speedMps 0\.2/,
      ],
      [
        'with a ramp of another row',
        {kind: 'line', line: {command: 'run', speedMps: 2, rampS: 3}},
        'line',
        /rampS 8/,
      ],
      [
        'with a speed for a stop',
        {kind: 'line', line: {command: 'stop', speedMps: 1, rampS: 4}},
        'line.speedMps',
        /only with run/,
      ],
      ['that disturbs', {kind: 'disturb', disturb: {supply: 0.5}}, 'kind', /no upsets/],
      ['with another factor', {kind: 'factor', factor: 3}, 'factor', /1, 2, 20/],
      ['with a hint there is not', {kind: 'hint', hint: 1}, 'hint', /0 … 0/],
      ['that answers no question', {kind: 'answer', question: 0, answer: 1}, 'question', /none/],
      ['that names a fault', {kind: 'namedFault', fault: 'x'}, 'kind', /no naming/],
    ];
    for (const [name, loose, path, message] of refused) {
      it(name, () => {
        const good = entry({kind: 'set', set: {kp: 0.2}}, 1);

        const error = thrownBy([good, entry(loose, 2)]);

        expect(error?.code).toBe('entry-refused');
        expect(faultsOf(error).map((fault) => fault.path)).toEqual([`body.entries.1.${path}`]);
        expect(faultsOf(error)[0]?.message).toMatch(message);
      });
    }

    it('that pauses where time runs on', () => {
      const strict: Exercise = {...exercise, time: {pause: 'none', factors: [1]}};

      for (const kind of ['pause', 'resume'] as const)
        expect(faultsOf(thrownBy([entry({kind})], {of: strict}))[0]?.value).toBe(kind);
    });
  });

  describe('is refused for a stamp', () => {
    const pause = (n: number, tick: number): Entry => entry({kind: 'pause'}, n, tick);
    const standing: Standing = {lastEntry: 4, lastEntryTick: 500, elapsedS: 3600};
    const refused: [name: string, entries: Entry[], path: string, message: string][] = [
      ['with a gap in n', [pause(6, 500)], 'entries.0.n', 'Allowed: 5'],
      ['with n again', [pause(5, 500), pause(5, 500)], 'entries.1.n', 'Allowed: 6'],
      ['before the last', [pause(5, 499)], 'entries.0.tick', 'Allowed: 500 … 1000'],
      ['that falls', [pause(5, 600), pause(6, 599)], 'entries.1.tick', 'Allowed: 600 … 1000'],
      ['not simulated yet', [pause(5, 1001)], 'entries.0.tick', 'Allowed: 500 … 1000'],
      [
        'after the end',
        [entry({kind: 'end', hash: '0'.repeat(16)}, 5, 600), pause(6, 600)],
        'entries.0.kind',
        'Allowed: only as the last entry',
      ],
    ];
    for (const [name, entries, path, message] of refused) {
      it(name, () => {
        const [fault, ...others] = faultsOf(thrownBy(entries, {standing}));

        expect(fault?.path).toBe(`body.${path}`);
        expect(fault?.message).toBe(message);
        expect(others).toEqual([]);
      });
    }

    it('beyond the length of the exercise', () => {
      const faults = faultsOf(thrownBy([pause(1, 30_001)], {throughTick: 30_001}));

      expect(faults.map(({path}) => path)).toEqual(['body.throughTick', 'body.entries.0.tick']);
      expect(thrownBy([pause(1, 30_000)], {throughTick: 30_000})).toBeUndefined();
    });

    it('before the trainee takes over', () => {
      const later = {...exercise, handOverS: 20};

      expect(faultsOf(thrownBy([pause(1, 1999)], {throughTick: 3000, of: later})).length).toBe(1);
      expect(thrownBy([pause(1, 2000)], {throughTick: 3000, of: later})).toBeUndefined();
    });

    it('beyond the number of entries, but for the end', () => {
      const full: Standing = {lastEntry: 20, lastEntryTick: 0, elapsedS: 3600};

      expect(faultsOf(thrownBy([pause(21, 10)], {standing: full}))[0]?.path).toMatch(/0\.n$/);
      const end = entry({kind: 'end', hash: '0'.repeat(16)}, 21, 10);
      expect(thrownBy([end], {standing: full})).toBeUndefined();
    });
  });

  it('is refused when it is further than 20 × the time since the start and 5 s', () => {
    const standing: Standing = {...long, elapsedS: 10};
    const limit = (20 * 10 + 5) * 100;
    const one = [entry({kind: 'pause'})];

    expect(thrownBy(one, {standing, throughTick: limit})).toBeUndefined();
    const error = thrownBy(one, {standing, throughTick: limit + 1});
    expect(error?.code).toBe('too-fast');
    expect(faultsOf(error)[0]?.value).toBe(limit + 1);
  });

  it('tells at most twenty faults, and no long value whole', () => {
    const many = Array.from({length: 100}, (each, index) =>
      entry({kind: 'set', set: {kp: 'x'.repeat(1000)}}, index + 1),
    );

    const faults = faultsOf(thrownBy(many));

    expect(faults.length).toBe(20);
    expect(JSON.stringify(faults[0]?.value).length).toBeLessThan(250);
  });

  it('is taken when all of it is allowed', () => {
    const allowed: Loose[] = [
      {kind: 'set', set: {kp: 0.05, mode: 'manual'}},
      {kind: 'set', set: {kp: 0.5, radiusRefM: null}},
      {kind: 'line', line: {command: 'run', speedMps: 1, rampS: 8}},
      {kind: 'line', line: {command: 'run', speedMps: 0.2, rampS: 3}},
      {kind: 'line', line: {command: 'stop', rampS: 6}},
      {kind: 'pause'},
      {kind: 'resume'},
      {kind: 'factor', factor: 20},
      {kind: 'hint', hint: 0},
      {kind: 'end', hash: '0'.repeat(16)},
    ];

    expect(thrownBy(allowed.map((loose, index) => entry(loose, index + 1)))).toBeUndefined();
  });
});
