import {type ExerciseToRun} from '#shared/exercises/exercise';
import {aStand} from '../../live-run/test-support/plant-here';

/** A short exercise on the stand of the specs: stop it gently. */
export function anExercise(changes: Partial<ExerciseToRun> = {}): ExerciseToRun {
  const stop = {command: 'stop', nth: -1} as const;
  return {
    format: 'evenspan.exercise/1',
    number: 7,
    title: 'Stop gently',
    level: 2,
    topics: ['stopping'],
    minutes: 5,
    brief: 'Stop the line.\n- Keep the web taut.\n- Then hand in.',
    cautions: [1],
    scenario: aStand(),
    handOverS: 0,
    target: {tensionN: 200, toleranceN: 20},
    touch: {
      settings: [{key: 'kp', lowest: 0.05, highest: 0.5}],
      commands: [
        {command: 'run', speedMps: [2, 2], rampS: [7, 7]},
        {command: 'stop', rampS: [3, 3]},
      ],
    },
    limits: {simulatedS: 300, tries: null, entries: 2000},
    time: {pause: 'free', factors: [1, 5, 20]},
    hintCosts: [],
    criteria: [
      {
        kind: 'measure',
        measure: 'peakN',
        window: {kind: 'commands', from: stop, forS: 8},
        full: 220,
        zero: 300,
        weight: 100,
      },
    ],
    passMark: 70,
    ...changes,
  };
}
