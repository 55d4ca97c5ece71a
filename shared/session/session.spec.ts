import {changed, refusedAt, shown} from '../test-support/changed';
import {Me, Preferences, SessionState, SignInDraft} from './session';

const me = {
  id: '0199f0a0-0000-7000-8000-000000000001',
  name: 'Rosa Lind',
  email: 'rosa.lind@harrow-lane.example',
  role: 'trainee',
  organisation: {
    id: '0199f0a0-0000-7000-8000-000000000002',
    name: 'Harrow Lane Converting',
    isDemo: true,
  },
  preferences: {units: 'si', theme: 'system'},
};
const account = {
  email: 'rosa.lind@harrow-lane.example',
  name: 'Rosa Lind',
  role: 'trainee',
  organisation: 'Harrow Lane Converting',
};

type Refused = readonly (readonly [path: string, value: unknown])[];

describe('Preferences', () => {
  it('accepts both families of units and every theme', () => {
    for (const units of ['si', 'us'])
      for (const theme of ['system', 'light', 'dark'])
        expect(refusedAt(Preferences, {units, theme})).toEqual([]);
  });

  const refused: Refused = [
    ['units', 'metric'],
    ['units', undefined],
    ['theme', null],
    ['theme', 'Dark'],
    ['language', 'en'],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      expect(refusedAt(Preferences, changed(me.preferences, path, value))).toEqual([path]);
    });
});

describe('Me', () => {
  it('accepts a person', () => {
    expect(refusedAt(Me, me)).toEqual([]);
  });

  const refused: Refused = [
    ['id', '7'],
    ['id', undefined],
    ['name', 5],
    ['role', 'owner'],
    ['organisation', null],
    ['organisation.id', 'harrow-lane'],
    ['organisation.isDemo', 'yes'],
    ['preferences.units', 'imperial'],
    ['passwordHash', '$argon2id$'],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      expect(refusedAt(Me, changed(me, path, value))).toEqual([path]);
    });
});

describe('SessionState', () => {
  it('accepts somebody signed in, and nobody', () => {
    expect(refusedAt(SessionState, {me, demoAccounts: []})).toEqual([]);
    const demoAccounts = [account, {...account, password: 'try it'}];
    expect(refusedAt(SessionState, {me: null, demoAccounts})).toEqual([]);
  });

  const refused: Refused = [
    ['me', undefined],
    ['me', {}],
    ['demoAccounts', undefined],
    ['demoAccounts.0.role', 'guest'],
    ['demoAccounts.0.id', 1],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      const at = refusedAt(SessionState, changed({me: null, demoAccounts: [account]}, path, value));

      expect(at.length).toBeGreaterThan(0);
      expect(at.every((each) => each === path || each.startsWith(`${path}.`))).toBeTrue();
    });
});

describe('SignInDraft', () => {
  const draft = {email: ' Rosa.Lind@Harrow-Lane.example ', password: ' with blanks '};

  it('trims the address and leaves the password alone', () => {
    expect(SignInDraft.parse(draft)).toEqual({
      email: 'rosa.lind@harrow-lane.example',
      password: ' with blanks ',
    });
  });

  const refused: Refused = [
    ['email', ''],
    ['email', '  a '],
    ['email', 'a'.repeat(255)],
    ['email', undefined],
    ['password', ''],
    ['password', 'x'.repeat(201)],
    ['password', 12345678],
    ['remember', true],
  ];
  for (const [path, value] of refused)
    it(`refuses ${shown(value)} as ${path}`, () => {
      expect(refusedAt(SignInDraft, changed(draft, path, value))).toEqual([path]);
    });
});
