import {STOP_WITHOUT_A_LOOP} from '../../demo/documents/stop-without-a-loop';
import {AppError} from '../../errors';
import {readExerciseDocument} from './read-exercise-document';

const good = STOP_WITHOUT_A_LOOP;
const [first, ...others] = good.criteria;

function pathsOf(document: unknown): string[] {
  try {
    readExerciseDocument(document);
    return [];
  } catch (error) {
    if (!(error instanceof AppError)) throw error; // not what is tested
    expect(error.code).toBe('not-publishable');
    return (error.details.errors ?? []).map(({path}) => path);
  }
}

const touching = (touch: object) => ({...good, touch: {settings: [], commands: [], ...touch}});
const withFirst = (change: object) => ({...good, criteria: [{...first, ...change}, ...others]});

describe('an exercise document', () => {
  const refused: [name: string, document: unknown, paths: string[]][] = [
    ['that is none', null, ['']],
    ['of another format', {...good, format: 'evenspan.exercise/2'}, ['format']],
    ['with a key too many', {...good, note: 1}, ['']],
    [
      'with a wrong scenario, every fault at once',
      {...good, scenario: {...good.scenario, seed: -1, web: {...good.scenario.web, widthM: 0}}},
      ['scenario.seed', 'scenario.web.widthM'],
    ],
    ['with an unknown measure', withFirst({measure: 'calm'}), ['criteria.0.measure']],
    ['with a criterion without slope', withFirst({full: 1, zero: 1}), ['criteria.0.zero']],
    [
      'with a window that ends before it begins',
      withFirst({window: {kind: 'times', fromS: 3, toS: 2}}),
      ['criteria.0.window.toS'],
    ],
    ['with weights that are not 100', withFirst({weight: 1}), ['criteria']],
    [
      'that opens a setting there is not',
      touching({settings: [{key: 'sampleS'}]}),
      ['touch.settings.0.key'],
    ],
    [
      'that opens one twice',
      touching({settings: [{key: 'kp'}, {key: 'kp'}]}),
      ['touch.settings.1.key'],
    ],
    [
      'that opens more than the engine takes',
      touching({settings: [{key: 'kp', lowest: -1, highest: 2000}]}),
      ['touch.settings.0.lowest', 'touch.settings.0.highest'],
    ],
    [
      'with a range the wrong way round',
      touching({settings: [{key: 'kp', lowest: 2, highest: 1}]}),
      ['touch.settings.0.highest'],
    ],
    [
      'with a choice there is not',
      touching({settings: [{key: 'mode', choices: ['automatic', 'off']}]}),
      ['touch.settings.0.choices.1'],
    ],
    [
      'with a run without speeds',
      touching({commands: [{command: 'run', rampS: [1, 2]}]}),
      ['touch.commands.0.speedMps'],
    ],
    [
      'with a stop with speeds, and a ramp the wrong way round',
      touching({commands: [{command: 'stop', speedMps: [1, 2], rampS: [3, 2]}]}),
      ['touch.commands.0.rampS.1', 'touch.commands.0.speedMps'],
    ],
    ['that hands over after its end', {...good, handOverS: 300}, ['handOverS']],
    [
      'that is too long for its sample period',
      {
        ...good,
        limits: {...good.limits, simulatedS: 3600},
        scenario: {...good.scenario, controller: {...good.scenario.controller, sampleS: 0.005}},
      },
      ['limits.simulatedS'],
    ],
  ];
  for (const [name, document, paths] of refused) {
    it(`${name} is refused`, () => {
      expect(pathsOf(document)).toEqual(paths);
    });
  }

  it('comes back as it is when all of it is right', () => {
    expect(readExerciseDocument(good)).toEqual(good);
    const choices = [
      {key: 'mode', choices: ['automatic', 'manual']},
      {key: 'kp', choices: [0.1, 0.2]},
      {key: 'bumpless', choices: [true]},
    ];
    expect(pathsOf(touching({settings: choices}))).toEqual([]);
  });
});
