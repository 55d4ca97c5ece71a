import {type Criterion, type LogEntry, PHASES, type RunEvent} from '#sim-core/index';
import {SET_FIELDS} from '#sim-core/scenario/fields';
import {PROBLEM_STATUS, type ProblemCode} from '../problem';
import {CAUTIONS} from './cautions';
import {criterionSentence, criterionValue, reasonSentence} from './criteria';
import {problemSentence} from './problems';
import {entryWords, eventWords, phaseWord, refusalSentence, spokenWords} from './run';
import {SETTING_WORDS, settingMeaning, settingName, settingValue} from './settings';

/** Every sentence of the product stays under this many words. */
const MOST_WORDS = 25;

function words(sentence: string): number {
  return sentence.split(/\s+/).length;
}

/** Words that no screen shows: a setting has a name, a roll has a diameter. */
const HIDDEN = /\b(Kp|kp|Ti|Td|radius|Radius|IAE)\b|undefined|NaN/;

const stop = {kind: 'commands', from: {command: 'stop', nth: -1, fromSpeedMps: 1.95}} as const;
const restart = {...stop, then: {command: 'run', withinS: [12, 20]}} as const;
const loop: Criterion = {
  kind: 'measure',
  measure: 'loopM',
  window: stop,
  full: 0.005,
  zero: 0.05,
  weight: 30,
};
const MEASURES = ['peakN', 'leastN', 'loopM', 'restN', 'inToleranceShare'] as const;
const WINDOWS = [
  stop,
  restart,
  {kind: 'commands', from: {command: 'run', nth: 0}},
  {kind: 'times', fromS: 20, toS: 30},
  {kind: 'phase', phase: 'running', nth: 0},
] as const;
const EVERY_CRITERION: readonly Criterion[] = MEASURES.flatMap((measure) =>
  WINDOWS.flatMap((window): Criterion[] => [
    {kind: 'measure', measure, window, full: 0.05, zero: 0.9, weight: 30},
    {kind: 'mustNot', measure, window, limit: 0.6},
  ]),
);

describe('criterionSentence', () => {
  const sentences: readonly (readonly [criterion: Criterion, sentence: string])[] = [
    [loop, 'Loop at the stop: at most 5 mm'],
    [{...loop, measure: 'leastN', full: 50, zero: 10}, 'Least tension at the stop: at least 50 N'],
    [
      {...loop, measure: 'peakN', window: restart, full: 215, zero: 285},
      'Peak tension at the next start: at most 215 N',
    ],
    [
      {kind: 'mustNot', measure: 'peakN', window: stop, limit: 600},
      'Peak tension at the stop must never pass 600 N',
    ],
    [
      {kind: 'mustNot', measure: 'leastN', window: WINDOWS[4], limit: 20},
      'Least tension while running must never fall below 20 N',
    ],
    [
      {...loop, measure: 'inToleranceShare', window: WINDOWS[3], full: 0.85, zero: 0.5},
      'Time in tolerance from 20 to 30 s: at least 85 %',
    ],
  ];
  for (const [criterion, sentence] of sentences)
    it(`says "${sentence}"`, () => {
      expect(criterionSentence(criterion, 'si')).toBe(sentence);
    });

  it('speaks in the units of the person', () => {
    expect(criterionSentence(loop, 'us')).toBe('Loop at the stop: at most 0.2 in');
    expect(criterionValue({...loop, measure: 'peakN'}, 264.3, 'us')).toBe('59.4 lbf');
    expect(criterionValue(loop, null, 'si')).toBe('–');
  });
});

describe('reasonSentence', () => {
  const REASONS = ['full', 'part', 'none', 'notDone', 'brokeBefore', 'kept', 'overLimit'] as const;

  it('is short, whole and free of symbols, for every criterion and reason', () => {
    for (const criterion of EVERY_CRITERION)
      for (const reason of REASONS) {
        const sentence = reasonSentence(criterion, {reason, value: 0.128}, 'si');

        expect(sentence).toMatch(/^[A-Z].*\.$/);
        expect(words(sentence)).withContext(sentence).toBeLessThan(MOST_WORDS);
        expect(sentence).not.toMatch(HIDDEN);
      }
  });

  it('tells what was seen where marks were lost', () => {
    const lost = reasonSentence(loop, {reason: 'none', value: 0.128}, 'si');
    const snatched = {...loop, measure: 'peakN', window: restart} as const;

    expect(lost).toContain('128 mm');
    expect(reasonSentence(snatched, {reason: 'part', value: 291}, 'si')).toMatch(
      /next start.*291 N/,
    );
    expect(reasonSentence({...snatched, window: stop}, {reason: 'none', value: 341}, 'si')).toMatch(
      /341 N.*boost/,
    );
  });

  it('tells a restart that is missing from a stop that is missing', () => {
    const missing = {reason: 'notDone', value: null} as const;

    expect(reasonSentence(loop, missing, 'si')).toContain('stop');
    expect(reasonSentence({...loop, window: restart}, missing, 'si')).toContain('start');
  });
});

describe('settings in words', () => {
  it('have a name for every key that can be set, and no symbol in it', () => {
    const names = SET_FIELDS.map(({path}) => settingName(path));

    for (const [place, name] of names.entries()) {
      expect(name)
        .withContext(SET_FIELDS[place]!.path)
        .toMatch(/^[A-Z][a-z]/);
      expect(name).not.toMatch(HIDDEN);
    }
    expect(new Set(names).size).toBe(names.length);
  });

  it('write every value the table allows, and off for null', () => {
    for (const {path, lowest, highest, choices, kind} of SET_FIELDS) {
      const values: unknown[] =
        kind === 'boolean' ? [true, false] : (choices?.slice() ?? [lowest, highest]);
      for (const value of kind === 'pairs' ? [[[0.1, 1]]] : values)
        expect(settingValue(path, value, 'si'))
          .withContext(path)
          .not.toMatch(HIDDEN);
      expect(settingValue(path, null, 'si')).toBe('off');
    }
  });

  const values: readonly (readonly [key: string, value: unknown, text: string])[] = [
    ['setPointN', 200, '200 N'],
    ['kp', 0.2, '0.2 % per %'],
    ['tiS', 0, 'off'],
    ['tiS', 0.12, '0.12 s'],
    ['startFraction', 0.7, '70.0 %'],
    ['stopHoldGain', 1.4, '1.40 ×'],
    ['radiusRefM', 0.25, '500 mm'],
    ['radiusCompensation', true, 'on'],
    ['mode', 'manual', 'manual'],
    ['inputSign', -1, 'turned round'],
    ['radiusSource', 'counted', 'counted turns'],
    ['fastStopHoldS', 3, '3 s'],
    ['gainByRadius', [[0.1, 0.5]], '1 point'],
  ];
  for (const [key, value, text] of values)
    it(`write ${key} ${JSON.stringify(value)} as ${text}`, () => {
      expect(settingValue(key, value, 'si')).toBe(text);
    });
});

describe('settingMeaning', () => {
  const facts = {rangeN: 500, settings: {setPointN: 200}};
  const meaning = (key: string, value: number, units: 'si' | 'us' = 'si'): string =>
    settingMeaning(key, value, facts, units);

  it('is worked out from the value', () => {
    // 1 N is 0.2 % of 500 N, times 0.35; 1 lbf is 4.448 N, so 0.31 %
    expect(meaning('kp', 0.35)).toBe('1 N too low gives 0.07 % more brake at once.');
    expect(meaning('kp', 0.35, 'us')).toBe('1.0 lbf too low gives 0.31 % more brake at once.');
    expect(meaning('startFraction', 0.7)).toContain('140 N');
    expect(meaning('setPointN', 200)).toContain('40 %');
    expect(meaning('tiS', 0.12)).toMatch(/^Shorter is stronger.*0\.12 s/);
  });

  it('says what off means', () => {
    for (const key of Object.keys(SETTING_WORDS).filter((each) => SETTING_WORDS[each]!.canBeOff))
      expect(meaning(key, 0)).withContext(key).toMatch(/^Off/);
  });

  it('has a short line for every setting that is shown', () => {
    for (const key of Object.keys(SETTING_WORDS))
      for (const value of [0, 0.5, 1, 40])
        for (const units of ['si', 'us'] as const) {
          const line = meaning(key, value, units);

          expect(line)
            .withContext(key)
            .toMatch(/^[A-Z0-9].*\.$/);
          expect(words(line)).withContext(line).toBeLessThan(MOST_WORDS);
          expect(line).not.toMatch(HIDDEN);
        }
    expect(meaning('mode', 0)).toBe('');
  });
});

describe('a run in words', () => {
  const stamp = {n: 1, tick: 0};
  const acts: readonly (readonly [entry: LogEntry, text: string | null])[] = [
    [{...stamp, kind: 'line', line: {command: 'run', speedMps: 2, rampS: 7}}, 'run 120 m/min'],
    [{...stamp, kind: 'line', line: {command: 'stop', rampS: 3}}, 'stop'],
    [{...stamp, kind: 'line', line: {command: 'fastStop', rampS: 1}}, 'fast stop'],
    [
      {...stamp, kind: 'set', set: {stopHoldGain: 1.4, stopHoldS: 5}},
      'Stop-hold boost 1.40 ×, Boost time 5 s',
    ],
    [{...stamp, kind: 'disturb', disturb: {radiusM: 0.25}}, 'roll change to 500 mm'],
    [{...stamp, kind: 'disturb', disturb: {supply: 0, zeroN: 5}}, 'air lost, zero moved'],
    [{...stamp, kind: 'disturb', disturb: {supply: 1}}, 'air back'],
    [{...stamp, kind: 'disturb', disturb: {knownLoadN: null}}, 'weight taken off'],
    [{...stamp, kind: 'pause'}, null],
  ];
  for (const [entry, text] of acts)
    it(`calls ${JSON.stringify(entry).slice(18, 70)} ${text ?? 'nothing'}`, () => {
      expect(entryWords(entry, 'si')).toBe(text);
    });

  it('has a word for every phase', () => {
    expect(PHASES.map(phaseWord)).toEqual([
      'standstill',
      'starting',
      'running',
      'stopping',
      'manual',
    ]);
  });

  it('say aloud the last event, and nothing before the first', () => {
    const stopping: RunEvent = {kind: 'phase', phase: 'stopping', atTick: 5, atS: 0.05};

    expect(spokenWords(stopping, 'si')).toBe('Phase: stopping');
    expect(spokenWords({kind: 'webBroke', atTick: 1, atS: 0.01}, 'si')).toBe('web broke');
    expect(spokenWords({kind: 'outputLimitBegan', atTick: 1, atS: 0.01}, 'si')).toBe('');
    expect(spokenWords(undefined, 'si')).toBe('');
  });

  it('say why an act was refused by the name of the setting', () => {
    const fault = {path: 'set.kp', value: 2000, allowed: '0 … 1000 %/%'};

    expect(refusalSentence(fault)).toBe('Not done: Gain allows 0 … 1000 %/%.');
  });

  it('tells the tension of a break in the units of the person', () => {
    const broke: RunEvent = {kind: 'webBroke', atTick: 1, atS: 0.01, value: 4003};

    expect(eventWords(broke, 'si')).toBe('web broke at 4003 N');
    expect(eventWords(broke, 'us')).toBe('web broke at 899.9 lbf');
    expect(eventWords({kind: 'webBroke', atTick: 1, atS: 0.01}, 'si')).toBe('web broke');
  });

  it('marks what happens and not what ends', () => {
    const said = (kind: RunEvent['kind']): string | null =>
      eventWords({kind, atTick: 1, atS: 0.01}, 'si');

    for (const kind of ['slackBegan', 'stretched', 'brakeHot', 'dancerStop', 'rollEmpty'] as const)
      expect(said(kind)).toMatch(/^[a-z]/);
    for (const kind of ['slackEnded', 'outputLimitEnded', 'phase'] as const)
      expect(said(kind)).toBeNull();
  });
});

describe('problemSentence', () => {
  it('has a short sentence for every code', () => {
    for (const code of Object.keys(PROBLEM_STATUS) as ProblemCode[]) {
      expect(problemSentence(code)).toMatch(/^[A-Z].*\.$/);
      expect(words(problemSentence(code)))
        .withContext(code)
        .toBeLessThan(MOST_WORDS);
    }
  });

  it('says how long to wait, where the server said so', () => {
    expect(problemSentence('too-many-requests', 0.2)).toContain('Wait 1 second,');
    expect(problemSentence('too-many-requests', 31.4)).toContain('Wait 32 seconds,');
    expect(problemSentence('too-many-requests', 601)).toContain('Wait 11 minutes,');
    expect(problemSentence('not-found', 30)).not.toContain('30');
  });
});

describe('CAUTIONS', () => {
  it('has all seventeen, each short', () => {
    expect(Object.keys(CAUTIONS)).toEqual(Array.from({length: 17}, (_, place) => `${place + 1}`));
    for (const caution of Object.values(CAUTIONS)) {
      expect(caution).toMatch(/^[A-Z].*\.$/);
      expect(words(caution)).withContext(caution).toBeLessThan(MOST_WORDS);
    }
  });
});
