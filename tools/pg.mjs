#!/usr/bin/env node
// A private PostgreSQL cluster on loopback. Plain Node, no packages.
//   node tools/pg.mjs run [--ephemeral] -- COMMAND…   start, run the command with DATABASE_URL, stop, pass its exit code on
//   node tools/pg.mjs start | stop | status           leave it running and print its address / stop it / say whether it runs
import {spawn, spawnSync} from 'node:child_process';
import {createHmac} from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import {fileURLToPath} from 'node:url';
import {isAlive, lock, nameOfProcess} from './lock.mjs';
import {
  answers,
  cleanEnvironment,
  livingServer,
  makeCluster,
  readPassword,
  startServer,
  stopServer,
} from './postgres/cluster.mjs';
import {findPrograms, makeFolder, NAME, pickUser, placeFor} from './postgres/place.mjs';

/** The server's own user, beside the owner. */
const SERVER = `${NAME}_server`;
/** The user that never leaves: `pg.mjs start`. */
const KEPT = 'kept';
/** One process may use a cluster several times. */
let calls = 0;

/**
 * Starts the cluster `.pg/<sub>`, made on first use, or joins it where it runs already, and resolves to
 * `{url, serverUrl, port, pid, dir, started, stop}`. The last one to stop stops the server.
 * `ephemeral`: no fsync, and emptied whenever nobody uses it. `keep`: it outlives this process.
 */
export async function startPostgres({
  sub = 'dev',
  ephemeral = false,
  keep = false,
  say = console.error,
} = {}) {
  const dir = placeFor(sub);
  const user = pickUser(dir);
  makeFolder(dir, user);
  const data = path.join(dir, 'data');
  const hold = await lock(path.join(dir, 'lock'));
  try {
    if (ephemeral && livingUsers(dir).length === 0) await empty(data);
    const programs = findPrograms(madeBy(data));
    const cluster = {programs, folder: dir, user, ephemeral, say};
    const running = livingServer(data);
    if (!running) makeCluster(cluster);
    const password = readPassword(cluster);
    const {pid, port} = running ?? (await startServer(cluster));
    if (running && !(await answers(programs, port)))
      throw new Error(`PostgreSQL (process ${pid}) does not answer.`);
    makeDatabase(programs, port, password);
    const own = keep ? KEPT : `${nameOfProcess()} ${++calls}`;
    addUser(dir, own);
    const place = `127.0.0.1:${port}/${NAME}`;
    return {
      url: `postgres://${NAME}:${password}@${place}`,
      serverUrl: `postgres://${SERVER}:${serverPassword(password)}@${place}`,
      port,
      pid,
      dir,
      started: !running,
      stop: stopper({dir, data, pid, ephemeral, own}),
    };
  } finally {
    hold.release();
  }
}

/** Stops a cluster, whoever uses it. */
export async function stopPostgres(sub = 'dev') {
  const dir = placeFor(sub);
  fs.rmSync(path.join(dir, 'users'), {recursive: true, force: true});
  const running = livingServer(path.join(dir, 'data'));
  if (running) await stopServer(running.pid, path.join(dir, 'data'));
}

function stopper({dir, data, pid, ephemeral, own}) {
  if (own === KEPT) return () => stopPostgres(path.basename(dir));
  let stopped;
  const leaveAtOnce = () => {
    removeUser(dir, own);
    try {
      if (livingUsers(dir).length === 0) process.kill(pid, 'SIGINT');
    } catch {
      // ESRCH: it has ended
    }
  };
  const leave = async () => {
    process.removeListener('exit', leaveAtOnce);
    const hold = await lock(path.join(dir, 'lock'));
    try {
      removeUser(dir, own);
      if (livingUsers(dir).length > 0) return;
      await stopServer(pid, data);
      if (ephemeral) await empty(data);
    } finally {
      hold.release();
    }
  };
  process.once('exit', leaveAtOnce);
  return () => (stopped ??= leave());
}

/** Names of the living processes that use the cluster, and `kept` when it is to stay. */
function livingUsers(dir) {
  const folder = path.join(dir, 'users');
  if (!fs.existsSync(folder)) return [];
  return fs.readdirSync(folder).filter((name) => {
    if (name === KEPT || isAlive(name.split(' ').slice(0, 2).join(' '))) return true;
    removeUser(dir, name);
    return false;
  });
}

function addUser(dir, name) {
  fs.mkdirSync(path.join(dir, 'users'), {recursive: true});
  fs.writeFileSync(path.join(dir, 'users', name), '');
}

function removeUser(dir, name) {
  fs.rmSync(path.join(dir, 'users', name), {force: true});
}

async function empty(data) {
  const running = livingServer(data);
  if (running) await stopServer(running.pid, data);
  fs.rmSync(data, {recursive: true, force: true});
}

function madeBy(data) {
  const file = path.join(data, 'PG_VERSION');
  return fs.existsSync(file) ? fs.readFileSync(file, 'utf8').trim() : undefined;
}

/** The program's database, and the server's own user, who owns nothing in it; what is there already stays. */
function makeDatabase(programs, port, password) {
  const server = serverPassword(password);
  const ask = (...statements) =>
    spawnSync(
      path.join(programs, 'psql'),
      ['-X', '-At', '-q', '-v', 'ON_ERROR_STOP=1', '-h', '127.0.0.1', '-p', String(port)].concat(
        ['-U', NAME, '-d', 'postgres'],
        statements.flatMap((each) => ['-c', each]),
      ),
      {env: cleanEnvironment({PGPASSWORD: password}), encoding: 'utf8'},
    );
  const asked = ask(
    `do $$ begin
       if not exists (select from pg_roles where rolname = '${SERVER}') then create role ${SERVER} login; end if;
     end $$`,
    `alter role ${SERVER} password '${server}'`,
    `select 1 from pg_database where datname = '${NAME}'`,
  );
  if (asked.status !== 0) {
    throw new Error(`The database could not be made ready: ${asked.stderr.trim()}`);
  }
  if (asked.stdout.trim() === '1') return;
  const made = ask(`create database ${NAME}`);
  if (made.status !== 0) throw new Error(`The database could not be made: ${made.stderr.trim()}`);
}

/** Follows from the owner's, so that nothing more has to be kept. */
function serverPassword(password) {
  return createHmac('sha256', password).update(SERVER).digest('hex').slice(0, 36);
}

async function run(command, options) {
  const postgres = await startPostgres(options);
  const env = {...process.env, DATABASE_URL: postgres.url};
  const child = spawn(command[0], command.slice(1), {stdio: 'inherit', env});
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
    process.on(signal, () => child.kill(signal));
  const code = await new Promise((resolve) => {
    child.once('error', (error) => resolve((console.error(error.message), 127)));
    child.once('exit', (exit, signal) => resolve(exit ?? 128 + os.constants.signals[signal]));
  });
  await postgres.stop();
  return code;
}

async function main(words) {
  const end = words.indexOf('--');
  const command = end < 0 ? [] : words.slice(end + 1);
  const asked = end < 0 ? words : words.slice(0, end);
  const ephemeral = asked.includes('--ephemeral');
  const options = {sub: ephemeral ? 'test' : 'dev', ephemeral};
  if (asked[0] === 'run' && command.length > 0) return run(command, options);
  if (asked[0] === 'start') console.log((await startPostgres({...options, keep: true})).url);
  else if (asked[0] === 'stop') await stopPostgres(options.sub);
  else if (asked[0] === 'status') {
    const data = path.join(placeFor(options.sub), 'data');
    console.log(livingServer(data) ? 'running' : 'stopped', data);
  } else {
    console.error('usage: pg.mjs run [--ephemeral] -- COMMAND… | start | stop | status');
    return 2;
  }
  return 0;
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  main(process.argv.slice(2)).then(
    (code) => process.exit(code),
    (error) => {
      console.error(error.message);
      process.exit(1);
    },
  );
}
