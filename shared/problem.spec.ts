import {Problem, PROBLEM_STATUS, PROBLEM_TYPE_PREFIX} from './problem';
import {changed, refusedAt, shown} from './test-support/changed';

const sample = {
  type: `${PROBLEM_TYPE_PREFIX}entry-refused`,
  code: 'entry-refused',
  title: 'The log was refused.',
  status: 422,
  requestId: '0199f0a0-0000-7000-8000-000000000001',
  errors: [{path: 'body.entries.3.tick', message: 'allowed: 40 … 90', value: 12}],
};

describe('Problem', () => {
  it('accepts every code', () => {
    for (const [code, status] of Object.entries(PROBLEM_STATUS))
      expect(refusedAt(Problem, {...sample, code, status})).toEqual([]);
  });

  it('accepts what only some problems have', () => {
    const whole = {...sample, detail: 'Tick 12 is past.', wanted: 4, retryAfterS: 12.5};

    expect(Problem.parse(whole)).toEqual(whole as Problem);
  });

  it('reads a problem of a newer server: a key it does not know is no fault', () => {
    expect(refusedAt(Problem, {...sample, trace: 'x'})).toEqual([]);
  });

  const refused: readonly (readonly [path: string, value: unknown])[] = [
    ['code', 'teapot'],
    ['code', undefined],
    ['type', undefined],
    ['title', null],
    ['status', '422'],
    ['status', 422.5],
    ['requestId', undefined],
    ['errors', undefined],
    ['errors', {}],
    ['errors.0.path', 3],
    ['errors.0.message', undefined],
    ['wanted', 1.5],
    ['retryAfterS', 'soon'],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      expect(refusedAt(Problem, changed(sample, path, value))).toEqual([path]);
    });
});

describe('PROBLEM_STATUS', () => {
  it('lists the codes in alphabetical order, each with a status of a failure', () => {
    const codes = Object.keys(PROBLEM_STATUS);

    expect(codes).toEqual(codes.toSorted());
    for (const status of Object.values(PROBLEM_STATUS)) {
      expect(status).toBeGreaterThanOrEqual(400);
      expect(status).toBeLessThan(600);
    }
  });
});
