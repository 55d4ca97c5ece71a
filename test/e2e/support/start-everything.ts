import {execFileSync} from 'node:child_process';
import path from 'node:path';
import {Client} from 'pg';
import {startPostgres} from '../../../tools/pg.mjs';
import {endProgram, freePort, programEnvironment, startProgram, waitUntilReady} from './programs';

const ROOT = path.resolve(import.meta.dirname, '../../..');

/** One built server and worker for all tests, on a database of their own; returns how to stop them. */
export default async function startEverything(): Promise<() => Promise<void>> {
  const cluster = await startPostgres({sub: 'e2e', ephemeral: true});
  const name = `evenspan_e2e_${process.pid}`;
  await ask(cluster.url, `create database ${name}`);
  const databaseUrl = Object.assign(new URL(cluster.url), {pathname: `/${name}`}).href;
  const port = await freePort();
  const environment = {...programEnvironment(databaseUrl, port), DEMO: '1'};
  execFileSync(process.execPath, ['dist/server/seed.js'], {
    cwd: ROOT,
    env: {PATH: process.env['PATH'], ...environment},
  });

  const url = `http://127.0.0.1:${port}`;
  const server = startProgram('main', environment);
  const worker = startProgram('worker', environment);
  await waitUntilReady(url, server);
  // Workers of the runner take these over.
  process.env['E2E_URL'] = url;
  process.env['E2E_DATABASE_URL'] = databaseUrl;

  return async () => {
    await endProgram(server, 'SIGTERM');
    await endProgram(worker, 'SIGTERM');
    await ask(cluster.url, `drop database ${name} with (force)`);
    await cluster.stop();
  };
}

async function ask(url: string, sql: string): Promise<void> {
  const client = new Client({connectionString: url});
  await client.connect();
  await client.query(sql);
  await client.end();
}
