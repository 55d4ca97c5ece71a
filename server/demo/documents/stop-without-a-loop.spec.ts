import {type CriterionResult, replay, scoreLog} from '#sim-core/index';
import {Exercise} from '#shared/exercises/exercise';
import {STOP_WITHOUT_A_LOOP} from './stop-without-a-loop';
import {
  carefulBoostLog,
  doubledBoostLog,
  lateBoostLog,
  passingLog,
  shortBoostLog,
  stopAndStartAgain,
  untouchedLog,
  type WrittenLog,
} from './stop-without-a-loop-logs';

const LOOP = 0;
const LEAST = 1;
const PEAK = 2;
const RESTART = 3;

function scored({entries, throughTick}: WrittenLog) {
  return scoreLog(STOP_WITHOUT_A_LOOP, entries, throughTick).score;
}

function lost(criteria: readonly CriterionResult[]): number[] {
  return criteria.filter(({reason}) => reason === 'none').map(({index}) => index);
}

// Expected figures: design study of the exercises, computed on another simulator of the same equations
// (128 mm and 2370 N untouched; 264, 58 and 200 N with 1.4 for 5 s; 341 N with 1.8; restart 292 N with 18 s).
describe('exercise: stop without a loop', () => {
  it('is a document that parses, its weights adding up to 100', () => {
    expect(Exercise.safeParse(STOP_WITHOUT_A_LOOP).success).toBeTrue();
    const weights = STOP_WITHOUT_A_LOOP.criteria.map((c) => (c.kind === 'measure' ? c.weight : 0));
    expect(weights.reduce((sum, weight) => sum + weight, 0)).toBe(100);
  });

  it('is passed by the right boost, with the figures of the design study', () => {
    const {score, passed, criteria} = scored(passingLog());

    expect(score).toBe(100);
    expect(passed).toBeTrue();
    expect(criteria[LEAST]!.value).toBeCloseTo(58, -0.5);
    expect(Math.abs(criteria[PEAK]!.value! - 264)).toBeLessThan(2);
    expect(Math.abs(criteria[RESTART]!.value! - 200)).toBeLessThan(2);
  });

  it('fails as it is found: a loop, and a snatch at the next start', () => {
    const {score, passed, criteria} = scored(untouchedLog());

    expect(passed).toBeFalse();
    expect(score).toBe(25);
    expect(Math.abs(criteria[LOOP]!.value! - 0.128)).toBeLessThan(0.003);
    expect(Math.abs(criteria[RESTART]!.value! - 2370)).toBeLessThan(25);
    expect(criteria.some(({reason}) => reason === 'overLimit')).toBeTrue();
  });

  it('gives the score worked out by hand when the boost is a little low', () => {
    // 1.3 for 5 s: no loop, so 30 of 30. Least 39.3 N lies between 10 N (none) and 50 N (all 25 marks):
    // 25 × (39.3 − 10)/(50 − 10) = 25 × 0.7325 = 18.3. Peak 245 N is under 280 N, so 25 of 25; restart peak
    // 200 N is under 215 N, so 20 of 20. 30 + 18.3 + 25 + 20 = 93.3.
    const {score, passed, criteria} = scored(carefulBoostLog());

    expect(criteria[LEAST]!.value).toBeCloseTo(39.3, 1);
    expect(score).toBe(93.3);
    expect(passed).toBeTrue();
  });

  it('lets each usual mistake fail on a criterion of its own', () => {
    const doubled = scored(doubledBoostLog());
    const late = scored(lateBoostLog());
    const short = scored(shortBoostLog());

    expect([doubled.passed, late.passed, short.passed]).toEqual([false, false, false]);
    expect(lost(doubled.criteria)).toEqual([PEAK]);
    expect(lost(late.criteria)).toEqual([RESTART]);
    expect(lost(short.criteria)).toContain(LOOP);
  });

  it('gives nothing for an empty log, for no restart and for one that comes too late', () => {
    const empty = scoreLog(STOP_WITHOUT_A_LOOP, [], 1000).score;
    const {entries} = passingLog();
    const noRestart = scoreLog(STOP_WITHOUT_A_LOOP, entries.slice(0, 3), 4000).score;
    const late = scored(stopAndStartAgain({stopHoldGain: 1.4, stopHoldS: 5}, 5000));

    expect(empty).toEqual(jasmine.objectContaining({score: 0, passed: false}));
    expect(noRestart.criteria[RESTART]!.reason).toBe('notDone');
    expect(late.criteria[RESTART]!.reason).toBe('notDone');
    expect([noRestart.passed, late.passed]).toEqual([false, false]);
  });

  it('moves by at most one point over 20 seeds of the noise', () => {
    const {entries, throughTick} = carefulBoostLog();
    const scores = Array.from({length: 20}, (_, place) => {
      const scenario = {...STOP_WITHOUT_A_LOOP.scenario, seed: place + 1};
      return scoreLog({...STOP_WITHOUT_A_LOOP, scenario}, entries, throughTick).score.score;
    });

    expect(Math.max(...scores) - Math.min(...scores)).toBeLessThanOrEqual(1);
  });

  it('has another hash when one entry moves by one tick', () => {
    const {entries, throughTick} = passingLog();
    const moved = entries.map((entry, place) =>
      place === 1 ? {...entry, tick: entry.tick + 1} : entry,
    );

    const hashes = [entries, moved].map((log) =>
      replay(STOP_WITHOUT_A_LOOP.scenario, log, throughTick).hash(),
    );

    expect(hashes[0]).toBe((entries.at(-1) as {hash: string}).hash);
    expect(hashes[1]).not.toBe(hashes[0]);
  });
});
