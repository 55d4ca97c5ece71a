import {type LogEntry} from '../run/log';
import {replay} from '../run/replay';
import {type TraceColumn} from '../run/trace';
import {ScenarioError} from '../scenario/faults';
import {aScenario} from '../test-support/a-scenario';
import {aTrace} from '../test-support/a-trace';
import {type Criterion, type CriterionResult, type Scored} from './criteria';
import {marksFor, scoreLog, scoreRun} from './score';
import {type GivenCommand, type RunFacts} from './windows';

const TARGET = {tensionN: 200, toleranceN: 10};
const EARLY = {kind: 'times', fromS: 0, toS: 10} as const;
const LATE = {kind: 'times', fromS: 10, toS: 20} as const;

/** Twenty seconds at 200 N, but for the columns given. */
function facts(
  columns: Partial<Record<TraceColumn, (row: number) => number>> = {},
  rest: Partial<RunFacts> = {},
): RunFacts {
  const rows = aTrace(2000, {tensionN: () => 200, ...columns});
  const commands: GivenCommand[] = [];
  return {rows, commands, sampleS: 0.01, endedEarly: false, ...rest};
}

function scored(criteria: readonly Criterion[], run: RunFacts, passMark = 70) {
  return scoreRun({criteria, target: TARGET, passMark}, run);
}

const peakOf = (window: Criterion['window'], weight: number) =>
  ({kind: 'measure', measure: 'peakN', window, full: 280, zero: 340, weight}) as const;
const leastOf = (window: Criterion['window'], weight: number) =>
  ({kind: 'measure', measure: 'leastN', window, full: 50, zero: 10, weight}) as const;

const reasons = (criteria: readonly CriterionResult[]): string[] =>
  criteria.map(({reason}) => reason);

// All marks are worked out by hand from the straight line between none and all.
describe('marksFor', () => {
  const marks: readonly (readonly [value: number, ofPeak: number, ofLeast: number])[] = [
    [0, 25, 0],
    [10, 25, 0],
    [30, 25, 12.5],
    [50, 25, 25],
    [280, 25, 25],
    [295, 18.8, 25], // 25 × 45/60 = 18.75
    [310, 12.5, 25],
    [340, 0, 25],
    [2370, 0, 25],
  ];
  for (const [value, ofPeak, ofLeast] of marks)
    it(`lies on the straight line at ${value} N`, () => {
      expect(marksFor(peakOf(EARLY, 25), value)).toBe(ofPeak);
      expect(marksFor(leastOf(EARLY, 25), value)).toBe(ofLeast);
    });

  it('gives all of a weight that has more decimals than marks have', () => {
    const third = peakOf(EARLY, 100 / 3);

    expect(marksFor(third, 200)).toBe(100 / 3);
    expect(scored([third, third, third], facts()).score).toBe(100);
  });
});

describe('scoreRun', () => {
  it('adds up the marks and tells value, reason and place of each', () => {
    const run = facts({tensionN: (row) => (row === 300 ? 310 : row === 1500 ? 42 : 200)});

    const {score, passed, criteria} = scored([peakOf(EARLY, 40), leastOf(LATE, 60)], run);

    // 40 × 30/60 = 20 and 60 × 32/40 = 48
    expect(score).toBe(68);
    expect(passed).toBeFalse();
    expect(criteria).toEqual([
      {
        index: 0,
        value: 310,
        marks: 20,
        reason: 'part',
        place: {fromTick: 300, toTick: 300, trace: 'tension'},
      },
      {
        index: 1,
        value: 42,
        marks: 48,
        reason: 'part',
        place: {fromTick: 1500, toTick: 1500, trace: 'tension'},
      },
    ]);
    expect(scored([peakOf(EARLY, 40), leastOf(LATE, 60)], run, 68).passed).toBeTrue();
  });

  it('does not pass with a criterion at zero, whatever the sum', () => {
    const run = facts({tensionN: (row) => (row === 300 ? 400 : 200)});

    const {score, passed} = scored([peakOf(EARLY, 20), leastOf(LATE, 80)], run);

    expect([score, passed]).toEqual([80, false]);
  });

  it('measures against the target, wherever the set point lies', () => {
    const inTolerance: Criterion = {
      kind: 'measure',
      measure: 'inToleranceShare',
      window: EARLY,
      full: 1,
      zero: 0,
      weight: 100,
    };
    const near = facts({tensionN: () => 87, setPointN: () => 87});
    const far = facts({tensionN: (row) => 195 + (row % 2) * 10, setPointN: () => 87});

    expect(scored([inTolerance], near).score).toBe(0);
    expect(scored([inTolerance], far).score).toBe(100);
  });

  it('caps at 40 what went beyond a must-not, and keeps the marks below', () => {
    const mustNot: Criterion = {kind: 'mustNot', measure: 'peakN', window: LATE, limit: 600};
    const wild = facts({tensionN: (row) => (row === 1500 ? 601 : 200)});
    const edge = facts({tensionN: (row) => (row === 1500 ? 600 : 200)});

    expect(scored([peakOf(EARLY, 100), mustNot], wild)).toEqual(
      jasmine.objectContaining({score: 40, passed: false}),
    );
    expect(scored([peakOf(EARLY, 100), mustNot], wild, 30).passed).toBeFalse();
    expect(scored([peakOf(EARLY, 30), peakOf(LATE, 70), mustNot], wild).score).toBe(30);
    expect(reasons(scored([mustNot], wild).criteria)).toEqual(['overLimit']);
    expect(reasons(scored([mustNot], edge).criteria)).toEqual(['kept']);
  });

  it('turns a must-not round where more is better', () => {
    const mustNot: Criterion = {kind: 'mustNot', measure: 'leastN', window: EARLY, limit: 5};

    expect(reasons(scored([mustNot], facts()).criteria)).toEqual(['kept']);
    expect(reasons(scored([mustNot], facts({tensionN: () => 4})).criteria)).toEqual(['overLimit']);
  });

  describe('when the web broke', () => {
    /** Ends at 12 s, inside the second window. */
    const broken = (tensionN: (row: number) => number): RunFacts =>
      facts({}, {rows: aTrace(1200, {tensionN}), endedEarly: true});

    it('keeps what was earned before, at most 40, and gives nothing for what was cut', () => {
      const run = broken(() => 200);

      const {score, passed, criteria} = scored(
        [peakOf(EARLY, 60), leastOf(EARLY, 20), peakOf(LATE, 20)],
        run,
      );

      expect([score, passed]).toEqual([40, false]);
      expect(reasons(criteria)).toEqual(['full', 'full', 'brokeBefore']);
      expect(criteria[2]).toEqual({
        index: 2,
        value: null,
        marks: 0,
        reason: 'brokeBefore',
        place: {fromTick: 1199, toTick: 1199, trace: 'tension'},
      });
      expect(scored([peakOf(EARLY, 25), peakOf(LATE, 75)], run).score).toBe(25);
    });

    it('still tells what was lost by then', () => {
      const run = broken((row) => (row === 1100 ? 900 : 200));
      const mustNot: Criterion = {kind: 'mustNot', measure: 'peakN', window: LATE, limit: 600};

      const {criteria} = scored([peakOf(LATE, 100), mustNot], run);

      expect(reasons(criteria)).toEqual(['none', 'overLimit']);
      expect(criteria[0]!.value).toBe(900);
    });

    it('says so of a part that the run never reached', () => {
      const after = {kind: 'times', fromS: 15, toS: 20} as const;

      const {criteria} = scored(
        [peakOf(after, 100)],
        broken(() => 200),
      );

      expect(reasons(criteria)).toEqual(['brokeBefore']);
      expect(criteria[0]!.place).toBeNull();
    });

    it('counts a window whole that ends with the last row', () => {
      const run = broken(() => 200);
      const whole = {kind: 'times', fromS: 10, toS: 12} as const;

      expect(reasons(scored([peakOf(whole, 100)], run).criteria)).toEqual(['full']);
    });
  });

  it('says that a part was not done while the run goes on, or was handed in', () => {
    const run = facts({}, {rows: aTrace(900, {tensionN: () => 200})});

    expect(reasons(scored([peakOf(LATE, 100)], run).criteria)).toEqual(['notDone']);
  });
});

describe('scoreLog', () => {
  const stop: LogEntry = {n: 1, tick: 1500, kind: 'line', line: {command: 'stop', rampS: 3}};
  const exercise: Scored = {
    scenario: aScenario({lineRoundS: 0.5}),
    target: {tensionN: 120, toleranceN: 10},
    criteria: [
      {
        kind: 'measure',
        measure: 'peakN',
        window: {kind: 'commands', from: {command: 'stop', nth: -1, fromSpeedMps: 1.95}, forS: 6},
        full: 130,
        zero: 300,
        weight: 100,
      },
    ],
    passMark: 70,
  };

  it('replays the log, and marks the same as the run that was recorded', () => {
    const {score, hash} = scoreLog(exercise, [stop], 2400);

    expect(hash).toBe(replay(exercise.scenario, [stop], 2400).hash());
    expect(score.criteria[0]!.value).toBeGreaterThan(100);
    expect(scoreLog(exercise, [stop], 2400)).toEqual({score, hash});
    expect(scoreLog(exercise, [], 2400).score.criteria[0]!.reason).toBe('notDone');
  });

  it('marks the true tension: a noisy sensor that nobody listens to changes nothing', () => {
    const manual = (noiseN: number): Scored => ({
      ...exercise,
      scenario: aScenario({
        sensing: {noiseN},
        controller: {mode: 'manual', manualPct: 40},
      }),
    });

    const [quiet, noisy] = [0, 20].map((noiseN) => scoreLog(manual(noiseN), [stop], 2400));

    expect(noisy!.score).toEqual(quiet!.score);
  });

  it('knows a break, and gives nothing for what it cut off', () => {
    // 10 N/m on 0.6 m: the web parts at 6 N, so in the first tick
    const weak: Scored = {...exercise, scenario: aScenario({web: {breakNPerM: 10}})};

    const {score} = scoreLog(weak, [], 2400);

    expect([score.score, score.passed]).toEqual([0, false]);
    expect(reasons(score.criteria)).toEqual(['brokeBefore']);
  });

  it('refuses a log that the live run would have refused', () => {
    const wild: LogEntry = {n: 1, tick: 5, kind: 'set', set: {kp: -1}};
    const gap: LogEntry = {...stop, n: 2};

    for (const entry of [wild, gap])
      expect(() => scoreLog(exercise, [entry], 2400)).toThrowError(ScenarioError);
  });
});
