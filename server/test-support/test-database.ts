import {randomBytes} from 'node:crypto';
import {Client} from 'pg';
import {pino} from 'pino';
import {startPostgres} from '../../tools/pg.mjs';
import {migrate} from '../db/migrate';

// The first database of a run waits for a cluster to be made, on a machine that others use too.
jasmine.DEFAULT_TIMEOUT_INTERVAL = 60_000;

/** The template is made and migrated once per process; every spec file gets a copy. */
let template: Promise<{adminUrl: string; name: string}> | undefined;
const mark = `evenspan_test_${process.pid}_${randomBytes(3).toString('hex')}`;
let copies = 0;

/** A database of one's own. */
export interface TestDatabase {
  readonly url: string;
  /** Runs SQL as the owner of the cluster, outside this database. */
  readonly admin: (sql: string) => Promise<void>;
  readonly drop: () => Promise<void>;
}

/** Migrated, without rows. */
export function makeTestDatabase(): Promise<TestDatabase> {
  return makeDatabase(true);
}

/** Without a single table of ours. */
export function makeEmptyDatabase(): Promise<TestDatabase> {
  return makeDatabase(false);
}

async function makeDatabase(isMigrated: boolean): Promise<TestDatabase> {
  template ??= makeTemplate();
  const {adminUrl, name: source} = await template;
  const name = `${mark}_${(copies += 1)}`;
  const admin = (sql: string): Promise<void> => ask(adminUrl, sql);
  await admin(`create database ${name} template ${isMigrated ? source : 'template1'}`);
  const drop = (): Promise<void> => admin(`drop database if exists ${name} with (force)`);
  return {url: urlOf(adminUrl, name), admin, drop};
}

async function makeTemplate(): Promise<{adminUrl: string; name: string}> {
  const given = process.env['DATABASE_URL_TEST_ADMIN'];
  const own = given ? undefined : await startPostgres({sub: 'test', ephemeral: true});
  const adminUrl = given ?? own?.url ?? '';
  const name = `${mark}_template`;
  await ask(adminUrl, `create database ${name}`);
  const url = urlOf(adminUrl, name);
  await migrate({databaseUrl: url, databaseOwnerUrl: url}, pino({level: 'silent'}));
  jasmine.getEnv().addReporter({
    jasmineDone: async () => {
      await ask(adminUrl, `drop database if exists ${name} with (force)`);
      await own?.stop();
    },
  });
  return {adminUrl, name};
}

function urlOf(adminUrl: string, name: string): string {
  const url = new URL(adminUrl);
  url.pathname = `/${name}`;
  return url.href;
}

async function ask(url: string, sql: string): Promise<void> {
  const client = new Client({connectionString: url});
  await client.connect();
  try {
    await client.query(sql);
  } finally {
    await client.end();
  }
}
