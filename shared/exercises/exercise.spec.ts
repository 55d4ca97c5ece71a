import {aScenario} from '#sim-core/test-support/a-scenario';
import {changed, refusedAt, shown} from '../test-support/changed';
import {Exercise, ExerciseSummary, ExerciseToRun, Touch} from './exercise';

const touch = {
  settings: [
    {key: 'kp', lowest: 0.05, highest: 0.5},
    {key: 'antiWindup', choices: ['none', 'conditional']},
  ],
  commands: [
    {command: 'run', speedMps: [2, 2], rampS: [7, 7]},
    {command: 'stop', rampS: [3, 3]},
  ],
};
const sample = {
  format: 'evenspan.exercise/1',
  number: 10,
  title: 'Stop without a loop',
  level: 3,
  topics: ['stopping'],
  minutes: 10,
  brief: 'Stop the line.\n- No loop.',
  cautions: [1, 17],
  scenario: aScenario(),
  handOverS: 0,
  target: {tensionN: 200, toleranceN: 20},
  touch,
  limits: {simulatedS: 300, tries: null, entries: 2000},
  time: {pause: 'free', factors: [1, 2]},
  hints: [{text: 'More boost.', cost: 5}],
  criteria: [
    {
      kind: 'mustNot',
      measure: 'peakN',
      window: {kind: 'times', fromS: 0, toS: 10},
      limit: 600,
    },
  ],
  passMark: 70,
};
const summary = {
  id: '0199f0a0-0000-7000-8000-000000000001',
  number: 10,
  title: 'Stop without a loop',
  level: 3,
  topics: [],
  minutes: 10,
  mine: {count: 0, best: null, hasPassed: false, openAttemptId: null},
};

type Refused = readonly (readonly [path: string, value: unknown])[];

describe('Touch', () => {
  it('accepts ranges, choices and commands, and nothing at all', () => {
    expect(refusedAt(Touch, touch)).toEqual([]);
    expect(refusedAt(Touch, {settings: [], commands: []})).toEqual([]);
  });

  const refused: Refused = [
    ['settings', undefined],
    ['settings.0.key', 7],
    ['settings.0.lowest', '0.05'],
    ['settings.0.unit', 's'],
    ['settings.1.choices', 'none'],
    ['commands.0.command', 'jog'],
    ['commands.0.rampS', undefined],
    ['commands.0.rampS', [7]],
    ['commands.0.speedMps', 2],
    ['upsets', []],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      const at = refusedAt(Touch, changed(touch, path, value));

      expect(at.length).toBe(1);
      expect(at[0]).toMatch(new RegExp(`^${path}`));
    });
});

describe('Exercise', () => {
  it('accepts the sample', () => {
    expect(refusedAt(Exercise, sample)).toEqual([]);
  });

  const refused: Refused = [
    ['format', 'evenspan.exercise/2'],
    ['format', undefined],
    ['number', 0],
    ['number', 1000],
    ['number', 1.5],
    ['title', ''],
    ['title', 'x'.repeat(121)],
    ['level', 0],
    ['level', 6],
    ['topics', Array(9).fill('x')],
    ['minutes', 121],
    ['brief', ''],
    ['brief', 'x'.repeat(4001)],
    ['cautions', [18]],
    ['cautions', [0]],
    ['scenario', undefined],
    ['scenario', 'coater'],
    ['scenario', null],
    ['handOverS', -1],
    ['handOverS', 601],
    ['target.tensionN', 0],
    ['target.toleranceN', -5],
    ['target.byS', 3],
    ['limits.simulatedS', 3601],
    ['limits.simulatedS', 0],
    ['limits.tries', 0],
    ['limits.tries', undefined],
    ['limits.entries', 5001],
    ['time.pause', 'sometimes'],
    ['time.factors', [0]],
    ['hints.0.cost', 101],
    ['hints.0.text', 'x'.repeat(501)],
    ['criteria', []],
    ['criteria.0', 5],
    ['passMark', 101],
    ['passMark', NaN],
    ['answer', 'boost 1.4'],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      const at = refusedAt(Exercise, changed(sample, path, value));

      expect(at.length).toBe(1);
      expect(at[0]).toMatch(new RegExp(`^${path}`));
    });
});

describe('ExerciseToRun', () => {
  it('has what hints cost and never what they say', () => {
    const {hints, ...rest} = sample;
    const toRun = {...rest, hintCosts: [5]};

    expect(refusedAt(ExerciseToRun, toRun)).toEqual([]);
    expect(refusedAt(ExerciseToRun, {...toRun, hints})).toEqual(['hints']);
    expect(refusedAt(ExerciseToRun, {...toRun, modelSolution: {}})).toEqual(['modelSolution']);
    expect(refusedAt(ExerciseToRun, rest)).toEqual(['hintCosts']);
  });
});

describe('ExerciseSummary', () => {
  it('accepts one never tried, and one tried', () => {
    const mine = {count: 3, best: 93.3, hasPassed: true, openAttemptId: summary.id};

    expect(refusedAt(ExerciseSummary, summary)).toEqual([]);
    expect(refusedAt(ExerciseSummary, {...summary, mine})).toEqual([]);
  });

  const refused: Refused = [
    ['id', '10'],
    ['number', '10'],
    ['mine', undefined],
    ['mine.count', 0.5],
    ['mine.best', undefined],
    ['mine.openAttemptId', 'none'],
    ['brief', 'Stop the line.'],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      expect(refusedAt(ExerciseSummary, changed(summary, path, value))).toEqual([path]);
    });
});
