import {aDancerScenario, aScenario, type Parts} from '../test-support/a-scenario';
import {startRun} from '../run/replay';
import {ScenarioError} from './faults';
import {FIELDS} from './fields';
import {readAct, readDisturb, readLine, readSet} from './read-act';
import {readScenario, scenarioFaults, tickOf, withDefaults} from './read-scenario';

/** Paths of everything wrong. */
function faultsIn(json: unknown): string[] {
  return scenarioFaults(json).map(({path}) => path);
}

/** A document with one value at a path replaced; undefined takes the key out. */
function withValue(path: string, value: unknown): unknown {
  const document = JSON.parse(JSON.stringify(aScenario())) as Record<string, unknown>;
  const keys = path.split('.');
  const last = keys.pop()!;
  const into = keys.reduce((at, key) => at[key] as Record<string, unknown>, document);
  if (value === undefined) Reflect.deleteProperty(into, last);
  else into[last] = value;
  return document;
}

describe('readScenario', () => {
  it('gives back a right document', () => {
    const document = aScenario();

    expect(readScenario(document)).toBe(document);
    expect(faultsIn(aDancerScenario())).toEqual([]);
  });

  it('names every fault at once, each with value and what is allowed', () => {
    const document = {...aScenario(), web: {widthM: -1, thicknessM: '5e-5'}, colour: 'red'};

    expect(faultsIn(document)).toEqual([
      'colour',
      'web.widthM',
      'web.thicknessM',
      'web.modulusPa',
      'web.densityKgM3',
      'web.breakNPerM',
    ]);
    expect(scenarioFaults(document)[1]).toEqual({
      path: 'web.widthM',
      value: -1,
      allowed: '0.001 … 20 m',
    });
    expect(() => readScenario(document)).toThrowError(
      ScenarioError,
      /web\.widthM: -1, allowed: 0\.001 … 20 m/,
    );
  });

  for (const json of [null, undefined, 3, 'x', [], [1]])
    it(`refuses ${JSON.stringify(json)} as a document`, () => {
      expect(() => readScenario(json)).toThrowError(ScenarioError);
    });

  it('asks for the format by name', () => {
    expect(faultsIn(withValue('format', 'evenspan.scenario/2'))).toEqual(['format']);
  });

  for (const field of FIELDS.filter(({onlyWith}) => onlyWith !== 'dancer')) {
    it(`keeps the limits of ${field.path}`, () => {
      const wrong = field.kind === 'boolean' || field.kind === 'text' ? 7 : 'seven';

      expect(faultsIn(withValue(field.path, wrong))).toContain(field.path);
      expect(faultsIn(withValue(field.path, null))).toContain(field.path);
      expect(faultsIn(withValue(field.path, NaN))).toContain(field.path);
      const without = faultsIn(withValue(field.path, undefined));
      expect(without.includes(field.path)).toBe(field.required);
      if (field.kind === 'number' || field.kind === 'whole') {
        const {lowest, highest} = field;
        expect(faultsIn(withValue(field.path, lowest! - 1e-3 - Math.abs(lowest!)))).toContain(
          field.path,
        );
        expect(faultsIn(withValue(field.path, highest! * 1.001 + 1))).toContain(field.path);
      }
    });
  }

  const wrong: readonly (readonly [why: string, document: unknown, path: string])[] = [
    ['a seed that is not whole', withValue('seed', 1.5), 'seed'],
    ['a roll smaller than its core', withValue('roll.radiusM', 0.05), 'roll.radiusM'],
    ['a step that does not divide the tick', withValue('plantStepS', 0.003), 'plantStepS'],
    ['a lag below two steps', withValue('brake.lagS', 0.0015), 'brake.lagS'],
    ['a filter below two steps', withValue('sensing.filterS', 0.001), 'sensing.filterS'],
    [
      'an input filter below two steps',
      withValue('controller.inputFilterS', 0.001),
      'controller.inputFilterS',
    ],
    [
      'compensation without its radius',
      withValue('controller.radiusCompensation', true),
      'controller.radiusRefM',
    ],
    [
      'a counted radius without one to start from',
      withValue('controller.radiusSource', 'counted'),
      'controller.radiusEnteredM',
    ],
    [
      'back-calculation without its time',
      withValue('controller.antiWindup', 'backCalculation'),
      'controller.trackingS',
    ],
    ['limits the wrong way round', withValue('controller.outMinPct', 100), 'controller.outMaxPct'],
    [
      'a curve that does not end at 100 %',
      withValue('brake.curve', [
        [0, 0],
        [90, 1],
      ]),
      'brake.curve',
    ],
    [
      'a curve whose x does not rise',
      withValue('brake.curve', [
        [0, 0],
        [50, 0.2],
        [50, 0.4],
        [100, 1],
      ]),
      'brake.curve',
    ],
    ['a key of the other sensing', withValue('sensing.travelM', 0.2), 'sensing.travelM'],
    ['a list that is none', withValue('line', {}), 'line'],
    [
      'a stop with a speed',
      withValue('line', [{atS: 1, command: 'stop', speedMps: 1, rampS: 2}]),
      'line[0].speedMps',
    ],
    [
      'a run without one',
      withValue('line', [{atS: 1, command: 'run', rampS: 2}]),
      'line[0].speedMps',
    ],
    ['an action that does nothing', withValue('actions', [{atS: 1}]), 'actions[0]'],
    [
      'an action that does two things',
      withValue('actions', [{atS: 1, set: {kp: 1}, disturb: {ovalM: 0}}]),
      'actions[0]',
    ],
    [
      'a set of what cannot be set live',
      withValue('actions', [{atS: 1, set: {sampleS: 0.02}}]),
      'actions[0].set.sampleS',
    ],
    [
      'a disturbance of an unknown key',
      withValue('actions', [{atS: 1, disturb: {thicknessM: 1}}]),
      'actions[0].disturb.thicknessM',
    ],
    [
      'a roll change below the core',
      withValue('actions', [{atS: 1, disturb: {radiusM: 0.01}}]),
      'actions[0].disturb.radiusM',
    ],
    [
      'a set that turns the limits round',
      withValue('actions', [
        {atS: 2, set: {outMaxPct: 10}},
        {atS: 1, set: {outMinPct: 20}},
      ]),
      'actions[0].set.outMaxPct',
    ],
    [
      'a plant too stiff for sixteen parts of a step',
      aScenario({web: {lossTimeS: 1, modulusPa: 3.5e10}}),
      'plantStepS',
    ],
  ];
  for (const [why, document, path] of wrong)
    it(`refuses ${why}`, () => {
      expect(faultsIn(document)).toEqual([path]);
    });

  it('lets sets agree in the order of their times, not of the list', () => {
    const actions: Parts = {
      actions: [
        {atS: 5, set: {outMinPct: 20}},
        {atS: 2, set: {outMaxPct: 50}},
      ],
    };

    expect(faultsIn(aScenario(actions))).toEqual([]);
  });

  it('has no use for a load on a dancer', () => {
    const document = aDancerScenario({actions: [{atS: 1, disturb: {knownLoadN: 50}}]});

    expect(faultsIn(document)).toEqual(['actions[0].disturb.knownLoadN']);
  });
});

describe('withDefaults', () => {
  it('writes every default out and changes no run', () => {
    const document = aScenario();
    const whole = withDefaults(document);
    const runs = [startRun(document), startRun(whole)];
    for (const run of runs) run.advance(300);

    expect(whole.lineRoundS).toBe(0);
    expect(whole.controller.antiWindup).toBe('conditional');
    expect(whole.web).not.toEqual(jasmine.objectContaining({stretchLimitPct: jasmine.anything()}));
    expect(faultsIn(whole)).toEqual([]);
    expect(runs[1]!.hash()).toBe(runs[0]!.hash());
  });
});

describe('tickOf', () => {
  it('is the first tick at or after the time, with 1e-9 s of grace', () => {
    expect(tickOf(0, 0.01)).toBe(0);
    expect(tickOf(0.3, 0.01)).toBe(30);
    expect(tickOf(0.3 + 5e-10, 0.01)).toBe(30);
    expect(tickOf(0.3 + 2e-9, 0.01)).toBe(31);
    expect(tickOf(123.45, 0.01)).toBe(12345);
  });
});

describe('acts', () => {
  const scenario = aScenario();

  it('are taken when right', () => {
    expect(readSet({kp: 0.2, startOutputPct: null})).toEqual({kp: 0.2, startOutputPct: null});
    expect(readLine({command: 'stop', rampS: 3})).toEqual({command: 'stop', rampS: 3});
    expect(readDisturb({knownLoadN: null}, scenario)).toEqual({knownLoadN: null});
    expect(readAct({set: {mode: 'manual'}}, scenario)).toEqual({set: {mode: 'manual'}});
  });

  for (const act of [
    null,
    {},
    {set: {}},
    {set: {kp: null}},
    {set: {kp: '1'}},
    {set: {inputSign: 0}},
    {set: {gainByRadius: [[0.1]]}},
    {line: {command: 'go', rampS: 1}},
    {line: {command: 'run', speedMps: 99, rampS: 1}},
    {disturb: {supply: 2}},
    {disturb: {radiusM: 0.01}},
    {dance: 1},
    {set: {kp: 1}, line: {command: 'stop', rampS: 1}},
  ])
    it(`are refused: ${JSON.stringify(act)}`, () => {
      expect(() => readAct(act, scenario)).toThrowError(ScenarioError);
    });
});

describe('any document at all', () => {
  // a counter with the multiplier of Numerical Recipes, so that a failure can be run again
  let word = 20_261_201;
  const draw = (count: number): number => {
    word = (Math.imul(word, 1664525) + 1013904223) >>> 0;
    return Math.floor((word / 4294967296) * count);
  };
  const STRANGE: readonly unknown[] = [
    null,
    undefined,
    NaN,
    Infinity,
    -1,
    0,
    1e308,
    '',
    'run',
    true,
    [],
    {},
    [[0, 0]],
    {a: 1},
    -0,
  ];

  function spoil(value: unknown, depth = 0): unknown {
    if (draw(12) === 0) return STRANGE[draw(STRANGE.length)];
    if (Array.isArray(value)) return value.map((item) => spoil(item, depth + 1));
    if (typeof value !== 'object' || value === null) return value;
    const entries = Object.entries(value).map(([key, item]) => [key, spoil(item, depth + 1)]);
    if (draw(10) === 0) entries.pop();
    if (draw(20) === 0) entries.push(['__proto__', 1], ['constructor', {}]);
    return Object.fromEntries(entries);
  }

  it('is read, or refused with a ScenarioError, never anything else', () => {
    const base = aScenario({
      actions: [
        {atS: 1, set: {kp: 1, gainByRadius: [[0.1, 1]]}},
        {atS: 2, disturb: {radiusM: 0.2, knownLoadN: null}},
      ],
    });
    let refused = 0;
    for (let i = 0; i < 3000; i++) {
      const document = spoil(i % 3 === 0 ? aDancerScenario() : base);
      try {
        startRun(document).advance(5);
      } catch (error) {
        if (!(error instanceof ScenarioError)) throw error;
        refused++;
      }
    }

    expect(refused).toBeGreaterThan(1000);
    expect(refused).toBeLessThan(3000);
  });

  it('within the limits of the table never runs into anything but an outcome', () => {
    const between = (lowest: number, highest: number): number => {
      const share = draw(1001) / 1000;
      return draw(6) === 0
        ? [lowest, highest][draw(2)]!
        : lowest + share * share * share * (highest - lowest);
    };
    let ran = 0;
    for (let i = 0; i < 600; i++) {
      const document = JSON.parse(
        JSON.stringify(i % 2 === 0 ? aScenario() : aDancerScenario()),
      ) as Record<string, Record<string, unknown>>;
      for (const {path, kind, lowest, highest, live} of FIELDS) {
        const [section, key] = path.split('.') as [string, string | undefined];
        if (kind !== 'number' || key === undefined || draw(4) !== 0) continue;
        if (document[section]![key] !== undefined || live)
          if (section !== 'sensing' || document[section]![key] !== undefined)
            document[section]![key] = between(lowest!, highest!);
      }
      try {
        const run = startRun(document);
        run.advance(200);
        if (run.outcome.kind !== 'diverged') {
          const {tensionN, outputPct} = run.view();
          expect(Number.isFinite(tensionN) && Number.isFinite(outputPct)).toBeTrue();
        }
        ran++;
      } catch (error) {
        if (!(error instanceof ScenarioError)) throw error;
      }
    }

    expect(ran).toBeGreaterThan(50);
  });
});

describe('a disturbance that makes the plant too quick', () => {
  // a short, stiff span on a heavy core: half as quick again with a roll of 0.14 m on it
  const quick = aScenario({
    web: {modulusPa: 4.3e11, thicknessM: 2e-4},
    span: {lengthM: 0.2},
    roll: {coreRadiusM: 0.0762, radiusM: 0.0763, coreInertiaKgM2: 0.5},
  });
  const faulty = (disturb: object): string[] =>
    scenarioFaults({...quick, actions: [{atS: 1, disturb}]}).map(({path}) => path);

  it('is refused by the key that does it', () => {
    expect(faulty({radiusM: 0.0764})).toEqual([]);
    expect(faulty({radiusM: 0.14})).toEqual(['actions[0].disturb.radiusM']);
    expect(faulty({modulusPa: 1e12})).toEqual(['actions[0].disturb.modulusPa']);
  });
});
