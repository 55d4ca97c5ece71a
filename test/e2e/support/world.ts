import {randomUUID} from 'node:crypto';
import {test as base} from '@playwright/test';
import {Client} from 'pg';
import {type LogEntry, type Scenario} from '#sim-core/index';
import {type Role} from '#shared/permissions';
import {expectNoMisdeeds, type Misdeeds, watch} from './quiet-page';

/** Of everybody made here: the demo's password, whose hash is copied. */
export const PASSWORD = 'even tension';
const DEMO_FIRM = 'Harrow Lane Converting';

/** An organisation of one test, with its own copy of the exercises. */
export class Organisation {
  constructor(
    private readonly client: Client,
    readonly id: string,
  ) {}

  /** Makes a person of this role; resolves to the e-mail. */
  async person(role: Role, name = `Sample ${role}`): Promise<string> {
    const email = `${role}-${randomUUID().slice(0, 8)}@sample.example`;
    await this.client.query(
      `insert into person (id, organisation_id, email, name, role, password_hash)
       select $1, $2, $3, $4, $5, password_hash from person
       where email = 'ines.holt@harrow-lane.example'`,
      [randomUUID(), this.id, email, name, role],
    );
    return email;
  }
}

/** An attempt as the database has it. */
export interface StoredAttempt {
  readonly id: string;
  readonly state: string;
  readonly seed: number;
  readonly entries: readonly LogEntry[];
  readonly throughTick: number;
  readonly hash: string | null;
  readonly hashAgrees: boolean | null;
  readonly score: number | null;
}

/** The database behind the tests: makes what no screen makes yet, and reads what was stored. */
export class World {
  constructor(readonly client: Client) {}

  async organisation(name = 'Sample Converting'): Promise<Organisation> {
    const id = randomUUID();
    await this.client.query('insert into organisation (id, name) values ($1, $2)', [id, name]);
    await this.client.query(
      `insert into exercise (id, organisation_id, number, state)
       select gen_random_uuid(), $1, exercise.number, exercise.state from exercise
       join organisation on organisation.id = exercise.organisation_id where organisation.name = $2`,
      [id, DEMO_FIRM],
    );
    await this.client.query(
      `insert into exercise_version (id, organisation_id, exercise_id, number, title, document)
       select gen_random_uuid(), $1, mine.id, version.number, version.title, version.document
       from exercise_version version
       join exercise theirs on theirs.id = version.exercise_id
       join organisation on organisation.id = theirs.organisation_id and organisation.name = $2
       join exercise mine on mine.organisation_id = $1 and mine.number = theirs.number`,
      [id, DEMO_FIRM],
    );
    return new Organisation(this.client, id);
  }

  /** The scenario of an attempt as it was run: the pinned version's, with the attempt's seed. */
  async scenarioOf({id, seed}: Pick<StoredAttempt, 'id' | 'seed'>): Promise<Scenario> {
    const {rows} = await this.client.query<{document: {scenario: Scenario}}>(
      `select document from exercise_version version join attempt
       on attempt.exercise_version_id = version.id where attempt.id = $1`,
      [id],
    );
    return {...rows[0]!.document.scenario, seed};
  }

  async attempt(attemptId: string): Promise<StoredAttempt> {
    const {rows: attempts} = await this.client.query<{state: string; seed: string}>(
      'select state, seed from attempt where id = $1',
      [attemptId],
    );
    const {rows: batches} = await this.client.query<{entries: LogEntry[]; through_tick: number}>(
      'select entries, through_tick from attempt_batch where attempt_id = $1 order by number',
      [attemptId],
    );
    const {rows: results} = await this.client.query<{
      hash: string;
      hash_agrees: boolean;
      score: number;
    }>('select hash, hash_agrees, score from attempt_result where attempt_id = $1', [attemptId]);
    return {
      id: attemptId,
      state: attempts[0]?.state ?? 'missing',
      seed: Number(attempts[0]?.seed),
      entries: batches.flatMap(({entries}) => entries),
      throughTick: batches.at(-1)?.through_tick ?? 0,
      hash: results[0]?.hash ?? null,
      hashAgrees: results[0]?.hash_agrees ?? null,
      score: results[0]?.score ?? null,
    };
  }
}

/** Tests get a world, and every page they open is watched for other hosts and console errors. */
export const test = base.extend<{world: World; misdeeds: Misdeeds}>({
  baseURL: async ({}, use) => {
    await use(process.env['E2E_URL']);
  },
  world: async ({}, use) => {
    const client = new Client({connectionString: process.env['E2E_DATABASE_URL']});
    await client.connect();
    await use(new World(client));
    await client.end();
  },
  misdeeds: [
    async ({context, baseURL}, use) => {
      const misdeeds = watch(context, baseURL ?? '');
      await use(misdeeds);
      expectNoMisdeeds(misdeeds);
    },
    {auto: true},
  ],
});
