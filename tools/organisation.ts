// npm run organisation -- create "Name" address: makes an organisation and its administrator.
import {randomBytes} from 'node:crypto';
import 'reflect-metadata';
import {makeDataSource} from '../server/db/data-source';
import {migrate} from '../server/db/migrate';
import {PeopleService} from '../server/features/people/people-service';
import {makeLog} from '../server/log';
import {sayWhy} from '../server/process';
import {startPostgres} from './pg.mjs';

const USAGE = 'usage: npm run organisation -- create "Name" address';

async function create(name: string, email: string): Promise<void> {
  const own = process.env['DATABASE_URL'] ? undefined : await startPostgres();
  const url = process.env['DATABASE_URL'] ?? own?.serverUrl ?? '';
  const databaseOwnerUrl = process.env['DATABASE_OWNER_URL'] ?? own?.url ?? url;
  try {
    await migrate({databaseUrl: url, databaseOwnerUrl}, makeLog('error'));
    const db = await makeDataSource(url).initialize();
    try {
      const password = randomBytes(12).toString('base64url');
      const administrator = {email, name: email, role: 'administrator', password} as const;
      await new PeopleService(db).foundOrganisation(name, administrator);
      console.log(`${name} is made. Its administrator signs in as ${email} with ${password}`);
    } finally {
      await db.destroy();
    }
  } finally {
    await own?.stop();
  }
}

const [verb, name = '', email = '', ...rest] = process.argv.slice(2).map((word) => word.trim());
if (verb !== 'create' || name === '' || !/^\S+@\S+$/.test(email) || rest.length > 0) {
  console.error(USAGE);
  process.exitCode = 2;
} else {
  try {
    await create(name, email);
  } catch (error) {
    console.error(sayWhy(error));
    process.exitCode = 1;
  }
}
