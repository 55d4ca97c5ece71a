import {readConfig} from './config';
import {makeDataSource} from './db/data-source';
import {withLock} from './db/lock';
import {migrate} from './db/migrate';
import {runDemo} from './demo/demo-step';
import {DEMO} from './demo/list';
import {DEMO_PASSWORD} from './features/people/demo-password';
import {PeopleService} from './features/people/people-service';
import {makeLog} from './log';
import {sayWhy} from './process';

/** Makes the demo, where it is not there yet, and prints its accounts. */
async function seed(): Promise<string> {
  const config = readConfig();
  const log = makeLog('error'); // standard output is for the accounts
  await migrate(config, log);
  const db = await makeDataSource(config.databaseUrl).initialize();
  try {
    await withLock(config.databaseUrl, 'seed', () =>
      runDemo(DEMO, {db, log, now: () => new Date()}),
    );
    const accounts = await new PeopleService(db).listDemoAccounts();
    const lines = accounts.map(
      ({email, role, organisation}) => `  ${email.padEnd(34)} ${role.padEnd(14)} ${organisation}`,
    );
    return [...lines, `  Password of all: ${DEMO_PASSWORD}`].join('\n');
  } finally {
    await db.destroy();
  }
}

try {
  process.stdout.write(`${await seed()}\n`);
} catch (error) {
  process.stderr.write(`${sayWhy(error)}\n`);
  process.exitCode = 1;
}
