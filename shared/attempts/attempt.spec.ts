import {aScenario} from '#sim-core/test-support/a-scenario';
import {changed, refusedAt, shown} from '../test-support/changed';
import {Attempt, AttemptResult, AttemptSummary, Batch, Beat, Entry, ListQuery} from './attempt';

const id = '0199f0a0-0000-7000-8000-000000000001';
const at = '2026-12-01T09:42:00.000Z';
const place = {fromTick: 2643, toTick: 2655, trace: 'tension'};
const result = {
  score: 93.3,
  passed: true,
  criteria: [
    {index: 0, value: 0, marks: 30, reason: 'full', place},
    {index: 1, value: null, marks: 0, reason: 'notDone', place: null},
  ],
  engine: 1,
  hash: '0123456789abcdef',
  hashAgrees: true,
  scoredAt: at,
};
const summary = {
  id,
  exercise: {id, number: 10, title: 'Stop without a loop'},
  person: {id, name: 'Rosa Lind'},
  state: 'scored',
  startedAt: at,
  handedInAt: at,
  score: 93.3,
  passed: true,
};
const toRun = {
  format: 'evenspan.exercise/1',
  number: 10,
  title: 'Stop without a loop',
  level: 3,
  topics: [],
  minutes: 10,
  brief: 'Stop the line.',
  cautions: [],
  scenario: aScenario(),
  handOverS: 0,
  target: {tensionN: 200, toleranceN: 20},
  touch: {settings: [], commands: []},
  limits: {simulatedS: 300, tries: null, entries: 2000},
  time: {pause: 'free', factors: [1]},
  criteria: [{}],
  passMark: 70,
  hintCosts: [],
};
const attempt = {
  ...summary,
  exerciseDocument: toRun,
  seed: 10,
  lastBatch: 3,
  throughTick: 5400,
  result,
  failure: null,
};
const entries: readonly object[] = [
  {n: 1, tick: 0, kind: 'line', line: {command: 'run', speedMps: 2, rampS: 7}},
  {n: 2, tick: 5, kind: 'set', set: {kp: 0.2, startOutputPct: null}},
  {n: 3, tick: 5, kind: 'disturb', disturb: {supply: 0}},
  {n: 4, tick: 5, kind: 'pause'},
  {n: 5, tick: 5, kind: 'resume'},
  {n: 6, tick: 5, kind: 'factor', factor: 20},
  {n: 7, tick: 5, kind: 'hint', hint: 0},
  {n: 8, tick: 5, kind: 'answer', question: 0, answer: 12.5},
  {n: 9, tick: 5, kind: 'answer', question: 1, answer: 'the roll'},
  {n: 10, tick: 5, kind: 'namedFault', fault: 'zero', place},
  {n: 11, tick: 5, kind: 'namedFault', fault: 'span'},
  {n: 12, tick: 9, kind: 'end', hash: '0123456789abcdef'},
];
const batch = {writerKey: id, number: 1, throughTick: 9, entries};

type Refused = readonly (readonly [path: string, value: unknown])[];

describe('AttemptResult', () => {
  it('accepts the sample and every reason the engine gives', () => {
    expect(refusedAt(AttemptResult, result)).toEqual([]);
    for (const reason of ['full', 'part', 'none', 'notDone', 'brokeBefore', 'kept', 'overLimit'])
      expect(refusedAt(AttemptResult, changed(result, 'criteria.0.reason', reason))).toEqual([]);
  });

  const refused: Refused = [
    ['score', 100.1],
    ['score', -1],
    ['passed', null],
    ['criteria', undefined],
    ['criteria.0.value', undefined],
    ['criteria.0.reason', 'unlucky'],
    ['criteria.0.place.trace', 'noise'],
    ['criteria.0.place.fromTick', 2.5],
    ['criteria.0.note', 'x'],
    ['engine', 'one'],
    ['hash', undefined],
    ['scoredAt', '1 December'],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      expect(refusedAt(AttemptResult, changed(result, path, value))).toEqual([path]);
    });
});

describe('AttemptSummary', () => {
  it('accepts one scored and one still running', () => {
    const running = {...summary, state: 'running', handedInAt: null, score: null, passed: null};

    expect(refusedAt(AttemptSummary, summary)).toEqual([]);
    expect(refusedAt(AttemptSummary, running)).toEqual([]);
  });

  const refused: Refused = [
    ['id', 'x'],
    ['state', 'lost'],
    ['exercise.number', '10'],
    ['person.email', 'rosa.lind@harrow-lane.example'],
    ['startedAt', 1764582120],
    ['handedInAt', undefined],
    ['score', '93.3'],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      expect(refusedAt(AttemptSummary, changed(summary, path, value))).toEqual([path]);
    });
});

describe('Attempt', () => {
  it('accepts one scored, and one that failed', () => {
    const failed = {...attempt, state: 'failed', result: null, failure: 'It took too long.'};

    expect(refusedAt(Attempt, attempt)).toEqual([]);
    expect(refusedAt(Attempt, failed)).toEqual([]);
  });

  const refused: Refused = [
    ['seed', 0.5],
    ['lastBatch', undefined],
    ['throughTick', '5400'],
    ['result', undefined],
    ['failure', 5],
    ['exerciseDocument.hints', []],
    ['writerKey', id],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      expect(refusedAt(Attempt, changed(attempt, path, value))).toEqual([path]);
    });
});

describe('Entry', () => {
  for (const entry of entries)
    it(`accepts ${JSON.stringify(entry).slice(0, 60)}`, () => {
      expect(Entry.parse(entry)).toEqual(entry as Entry);
    });

  const refused: readonly (readonly [why: string, entry: unknown, path: string])[] = [
    ['n from 0', {n: 0, tick: 0, kind: 'pause'}, 'n'],
    ['no n', {tick: 0, kind: 'pause'}, 'n'],
    ['half a tick', {n: 1, tick: 0.5, kind: 'pause'}, 'tick'],
    ['a tick before the start', {n: 1, tick: -1, kind: 'pause'}, 'tick'],
    ['a kind there is not', {n: 1, tick: 0, kind: 'undo'}, 'kind'],
    ['a time of its own', {n: 1, tick: 0, kind: 'pause', atS: 3}, 'atS'],
    ['a set without keys and values', {n: 1, tick: 0, kind: 'set', set: 5}, 'set'],
    ['a set in a line', {n: 1, tick: 0, kind: 'line', set: {}}, 'line,set'],
    ['a factor of nothing', {n: 1, tick: 0, kind: 'factor', factor: 0}, 'factor'],
    ['a hint before the first', {n: 1, tick: 0, kind: 'hint', hint: -1}, 'hint'],
    [
      'an answer that is no word',
      {n: 1, tick: 0, kind: 'answer', question: 0, answer: true},
      'answer',
    ],
    [
      'an answer without end',
      {n: 1, tick: 0, kind: 'answer', question: 0, answer: 'x'.repeat(201)},
      'answer',
    ],
    ['an end without a hash', {n: 1, tick: 0, kind: 'end'}, 'hash'],
    ['a short hash', {n: 1, tick: 0, kind: 'end', hash: '0123'}, 'hash'],
    ['a hash in capitals', {n: 1, tick: 0, kind: 'end', hash: '0123456789ABCDEF'}, 'hash'],
    ['a score', {n: 1, tick: 0, kind: 'end', hash: '0123456789abcdef', score: 100}, 'score'],
  ];
  for (const [why, entry, path] of refused)
    it(`refuses ${why}`, () => {
      expect(refusedAt(Entry, entry).join()).toBe(path);
    });
});

describe('Batch', () => {
  it('accepts the sample and 500 entries', () => {
    const many = Array.from({length: 500}, (_, i) => ({n: i + 1, tick: i, kind: 'pause'}));

    expect(refusedAt(Batch, batch)).toEqual([]);
    expect(refusedAt(Batch, {...batch, entries: many})).toEqual([]);
  });

  const refused: Refused = [
    ['writerKey', 'mine'],
    ['writerKey', undefined],
    ['number', 0],
    ['throughTick', -1],
    ['throughTick', Infinity],
    ['entries', []],
    ['entries', Array(501).fill(entries[3])],
    ['entries', undefined],
    ['entries.3.tick', '5'],
    ['score', 100],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      expect(refusedAt(Batch, changed(batch, path, value))).toEqual([path]);
    });
});

describe('Beat', () => {
  it('accepts where the run is, and no score', () => {
    const beat = {writerKey: id, throughTick: 100};

    expect(refusedAt(Beat, beat)).toEqual([]);
    expect(refusedAt(Beat, {...beat, score: 100})).toEqual(['score']);
    expect(refusedAt(Beat, {...beat, throughTick: 0.5})).toEqual(['throughTick']);
  });
});

describe('ListQuery', () => {
  it('reads the words of a query', () => {
    expect(ListQuery.parse({})).toEqual({limit: 50});
    expect(ListQuery.parse({limit: '7', cursor: 'abc'})).toEqual({limit: 7, cursor: 'abc'});
  });

  const refused: Refused = [
    ['limit', '0'],
    ['limit', '101'],
    ['limit', 'all'],
    ['limit', '1.5'],
    ['cursor', 'x'.repeat(201)],
    ['exerciseId', '10'],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      expect(refusedAt(ListQuery, {[path]: value})).toEqual([path]);
    });
});
