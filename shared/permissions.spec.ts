import {may, type Permission, PERMISSIONS, type Role, ROLES} from './permissions';

/** Who may do what, written down a second time: source: the table of roles in the product's design. */
const TABLE: Readonly<Record<Permission, readonly Role[]>> = {
  'attempts:read-others': ['instructor', 'administrator'],
  'attempts:read-own': ['trainee', 'technician', 'instructor'],
  'attempts:run': ['trainee', 'technician', 'instructor'],
  'bench:use': ['trainee', 'technician', 'instructor', 'administrator'],
  'exercises:read': ['trainee', 'technician', 'instructor', 'administrator'],
};

describe('may', () => {
  for (const permission of Object.keys(PERMISSIONS) as Permission[])
    for (const role of ROLES) {
      const allowed = TABLE[permission].includes(role);
      it(`${allowed ? 'lets' : 'does not let'} the ${role} ${permission}`, () => {
        expect(may(role, permission)).toBe(allowed);
      });
    }

  it('never lets a trainee read what others did', () => {
    const others = Object.keys(PERMISSIONS).filter((name) => name.endsWith('-others'));

    expect(others.length).toBeGreaterThan(0);
    for (const name of others) expect(may('trainee', name as Permission)).toBeFalse();
  });
});
