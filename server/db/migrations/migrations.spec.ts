import {pino} from 'pino';
import {type DataSource} from 'typeorm';
import {makeEmptyDatabase, type TestDatabase} from '../../test-support/test-database';
import {makeDataSource} from '../data-source';
import {isMigrated} from '../is-migrated';
import {migrate} from '../migrate';
import {MIGRATIONS} from './list';

const log = pino({level: 'silent'});

describe('the migrations', () => {
  let database: TestDatabase;
  let db: DataSource;

  beforeEach(async () => {
    database = await makeEmptyDatabase();
    db = await makeDataSource(database.url).initialize();
  });

  afterEach(async () => {
    await db.destroy();
    await database.drop();
  });

  const both = () => ({databaseUrl: database.url, databaseOwnerUrl: database.url});
  const tables = async () => {
    const rows: {name: string}[] = await db.query(
      "select table_name as name from information_schema.tables where table_schema = 'public'",
    );
    return rows.map(({name}) => name).sort();
  };

  it('give what the entities describe, no more and no less', async () => {
    await migrate(both(), log);

    const {upQueries} = await db.driver.createSchemaBuilder().log();

    expect(upQueries.map(({query}) => query)).toEqual([]);
  });

  it('can each be undone and done again', async () => {
    expect(await isMigrated(db)).toBeFalse();
    await migrate(both(), log);
    expect(await isMigrated(db)).toBeTrue();
    const made = await tables();

    for (const done of MIGRATIONS) {
      await db.undoLastMigration();
      expect(await isMigrated(db))
        .withContext(`an undo beside ${done.name}`)
        .toBeFalse();
    }
    const left = await tables();
    await db.runMigrations();

    expect(left).toEqual(['migration']);
    expect(await tables()).toEqual(made);
  });

  it('take turns when two processes start at once', async () => {
    await Promise.all([migrate(both(), log), migrate(both(), log), migrate(both(), log)]);

    const rows: {name: string}[] = await db.query('select name from migration order by id');
    expect(rows.map(({name}) => name)).toEqual(MIGRATIONS.map(({name}) => name));
  });

  it('are listed in the order of their times, the name bearing the time', () => {
    const times = MIGRATIONS.map(({name}) => Number(/\d{13}$/.exec(name)?.[0]));

    expect(times).toEqual([...times].sort((a, b) => a - b));
  });

  it('refuse a link across organisations in the database itself, wherever one table refers to another', async () => {
    await migrate(both(), log);

    const loose: {link: string}[] = await db.query(`
      select conrelid::regclass || ' → ' || confrelid::regclass as link
      from pg_constraint
      where contype = 'f' and connamespace = 'public'::regnamespace
        and confrelid <> 'organisation'::regclass
        and not exists (
          select from unnest(conkey) as key
          join pg_attribute on attrelid = conrelid and attnum = key
          where attname = 'organisation_id')`);

    expect(loose.map(({link}) => link)).toEqual([]);
  });
});

describe('two database users', () => {
  it('leave the server with rows to read and write, and no table to change', async () => {
    const database = await makeEmptyDatabase();
    const user = `server_${Date.now()}`;
    await database.admin(`create role ${user} login password 'word'`);
    const url = new URL(database.url);
    url.username = user;
    url.password = 'word';
    const settings = {databaseUrl: url.href, databaseOwnerUrl: database.url};
    await migrate(settings, log);
    await migrate(settings, log); // a second start changes nothing
    const db = await makeDataSource(url.href).initialize();

    const refused = async (sql: string): Promise<string> => {
      const thrown: unknown = await db.query(sql).then(
        () => undefined,
        (error: unknown) => error,
      );
      return (thrown as {code?: string} | undefined)?.code ?? 'allowed';
    };
    const answers = {
      read: await refused('select * from person'),
      sendJobs: await refused('select * from pgboss.job'),
      alter: await refused('alter table person add note text'),
      drop: await refused('drop table session'),
      forge: await refused("insert into migration (timestamp, name) values (1, 'x')"),
      trigger: await refused('alter table person disable trigger all'),
    };
    await db.destroy();
    await database.drop();
    await database.admin(`drop role ${user}`);

    // 42501: insufficient_privilege
    expect(answers).toEqual({
      read: 'allowed',
      sendJobs: 'allowed',
      alter: '42501',
      drop: '42501',
      forge: '42501',
      trigger: '42501',
    });
  });
});
