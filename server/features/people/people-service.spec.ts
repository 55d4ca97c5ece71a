import {AppError} from '../../errors';
import {useTestServer} from '../../test-support/test-server';
import {DEMO} from '../../demo/list';
import {runDemo} from '../../demo/demo-step';
import {PeopleService} from './people-service';

const draft = {name: 'Ann Sample', role: 'trainee', password: 'a good password'} as const;

describe('people', () => {
  const server = useTestServer();
  const people = () => new PeopleService(server().db);
  const count = async (table: string): Promise<number> => {
    const [{n}] = await server().db.query<[{n: number}]>(`select count(*)::int as n from ${table}`);
    return n;
  };

  describe('are refused', () => {
    it('under an address that exists, in whatever organisation and letters', async () => {
      const [one, other] = [await server().organisation(), await server().organisation()];
      await people().createPerson(one, {...draft, email: 'ann@people.example'});

      const thrown: unknown = await people()
        .createPerson(other, {...draft, email: 'Ann@People.example'})
        .catch((error: unknown) => error);

      expect((thrown as AppError).code).toBe('in-use');
    });

    it('with their organisation, when the first of them is', async () => {
      const {email} = await server().person('trainee');
      const before = await count('organisation');

      const founding = people().foundOrganisation('New Mill', {...draft, email});

      await expectAsync(founding).toBeRejectedWith(jasmine.any(AppError));
      expect(await count('organisation')).toBe(before);
    });
  });

  it('are kept with a hash of their password that no other has', async () => {
    const organisation = await server().organisation();
    for (const n of [1, 2])
      await people().createPerson(organisation, {...draft, email: `same-${n}@people.example`});

    const rows: {hash: string}[] = await server().db.query(
      "select password_hash as hash from person where email like 'same-%'",
    );

    // 19 MiB, two passes, one lane
    expect(rows.every(({hash}) => hash.startsWith('$argon2id$v=19$m=19456,t=2,p=1$'))).toBeTrue();
    expect(rows[0]?.hash).not.toBe(rows[1]?.hash);
  });

  it('sign in with their own password only', async () => {
    const {email} = await server().person('trainee');

    expect(await people().findBySignIn(email, 'a password for tests')).toBeDefined();
    expect(await people().findBySignIn(email, 'A password for tests')).toBeUndefined();
  });

  it('of the demo are made once, however often the demo is', async () => {
    const {db, parts} = {db: server().db, parts: server().parts};
    await runDemo(DEMO, {db, log: parts.log, now: parts.now});
    const once = [await count('organisation'), await count('person')];

    await runDemo(DEMO, {db, log: parts.log, now: parts.now});

    expect([await count('organisation'), await count('person')]).toEqual(once);
    const accounts = await people().listDemoAccounts();
    const firms = new Set(accounts.map(({organisation}) => organisation));
    expect([...firms]).toEqual(['Harrow Lane Converting', 'Tarn Mill Nonwovens']);
    expect(new Set(accounts.map(({role}) => role)).size).toBe(4);
  });
});

describe('a demo', () => {
  it('runs each step once, after those it names', async () => {
    const ran: string[] = [];
    const step = (name: string, ...after: {name: string}[]) => ({
      name,
      after: after as never,
      run: () => Promise.resolve(void ran.push(name)),
    });
    const people = step('people');
    const exercises = step('exercises', people);
    const log = {info: () => undefined} as never;

    await runDemo([step('attempts', exercises, people), exercises, people], {
      db: undefined as never,
      log,
      now: () => new Date(),
    });

    expect(ran).toEqual(['people', 'exercises', 'attempts']);
  });
});
