// Makes, starts and stops one cluster's server process. Who may do so, and when, is decided in ../pg.mjs.
import {spawn, spawnSync} from 'node:child_process';
import {randomBytes} from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import {setTimeout as sleep} from 'node:timers/promises';
import {freePort, portIsFree} from '../ports.mjs';
import {NAME} from './place.mjs';

const READY_WITHIN_MS = 60_000;
/** A test cluster may lose everything at a power cut. */
const EPHEMERAL = ['-c', 'fsync=off', '-c', 'synchronous_commit=off', '-c', 'full_page_writes=off'];

/** The environment without the caller's own PostgreSQL settings. */
export function cleanEnvironment(extra = {}) {
  const kept = Object.entries(process.env).filter(([key]) => !key.startsWith('PG'));
  return {...Object.fromEntries(kept), LC_ALL: 'C.UTF-8', ...extra};
}

/** Makes the data folder on first use; beside it and then by rename, so that a broken-off one is never taken for whole. */
export function makeCluster({programs, folder, user, ephemeral, say}) {
  const data = path.join(folder, 'data');
  // A name of its own: the initdb of a start that was killed may still be writing its own.
  const draft = path.join(folder, `data.new-${process.pid}`);
  for (const left of fs.readdirSync(folder).filter((name) => name.startsWith('data.new-'))) {
    fs.rmSync(path.join(folder, left), {
      recursive: true,
      force: true,
      maxRetries: 20,
      retryDelay: 100,
    });
  }
  if (fs.existsSync(data) && !fs.existsSync(path.join(data, 'global', 'pg_control'))) {
    const aside = path.join(folder, `data.half-made-${Date.now()}`);
    fs.renameSync(data, aside);
    say(`The database folder was only half made; it is kept as ${aside} and a new one is made.`);
  }
  if (fs.existsSync(data)) return;
  const secret = writePassword(folder, user);
  const made = spawnSync(
    path.join(programs, 'initdb'),
    [
      '-D',
      draft,
      '-U',
      NAME,
      `--pwfile=${secret}`,
      '--auth=scram-sha-256',
      '--encoding=UTF8',
    ].concat('--locale=C.UTF-8', ephemeral ? ['--no-sync'] : []),
    {...user, cwd: folder, env: cleanEnvironment(), encoding: 'utf8'},
  );
  if (made.status !== 0) {
    fs.rmSync(draft, {recursive: true, force: true});
    throw new Error(`The database could not be made: ${made.error?.message ?? made.stderr.trim()}`);
  }
  fs.renameSync(draft, data);
}

/** The cluster's password; a lost one is set anew, which its owner may do without the old one. */
export function readPassword({programs, folder, user}) {
  const secret = path.join(folder, 'password');
  if (fs.existsSync(secret)) return fs.readFileSync(secret, 'utf8');
  writePassword(folder, user);
  const password = fs.readFileSync(secret, 'utf8');
  const set = spawnSync(
    path.join(programs, 'postgres'),
    ['--single', '-D', path.join(folder, 'data'), 'postgres'],
    {
      ...user,
      cwd: folder,
      env: cleanEnvironment(),
      encoding: 'utf8',
      input: `alter role ${NAME} password '${password}';\n`,
    },
  );
  if (set.status !== 0) throw new Error(`The database password could not be set: ${set.stderr}`);
  return password;
}

/** Starts the server on the remembered port, or on a free one, and waits until it answers. */
export async function startServer({programs, folder, user, ephemeral}) {
  const remembered = path.join(folder, 'port');
  const log = path.join(folder, 'server.log');
  let port = fs.existsSync(remembered) ? Number(fs.readFileSync(remembered, 'utf8')) : 0;
  for (let tries = 1; ; tries++) {
    if (!(await portIsFree(port))) port = await freePort();
    const child = await spawnServer({programs, folder, user, ephemeral, log, port});
    if (await answers(programs, port, child)) {
      fs.writeFileSync(remembered, String(port));
      child.unref();
      return {pid: child.pid, port};
    }
    port = 0; // taken in between, perhaps
    if (tries === 3) {
      const end = fs.readFileSync(log, 'utf8').trimEnd().split('\n').slice(-8).join('\n');
      throw new Error(`PostgreSQL did not start; the end of ${log}:\n${end}`);
    }
  }
}

/** Whether the server answers within a minute; false as soon as `child` has ended. */
export async function answers(programs, port, child) {
  const ask = ['-q', '-h', '127.0.0.1', '-p', String(port)];
  for (const end = Date.now() + READY_WITHIN_MS; Date.now() < end; await sleep(50)) {
    if (child && (child.exitCode !== null || child.signalCode !== null)) return false;
    const asked = spawnSync(path.join(programs, 'pg_isready'), ask, {env: cleanEnvironment()});
    if (asked.status === 0) return true;
  }
  return false;
}

/**
 * `{pid, port}` of the server on this data folder, or undefined. A stale postmaster.pid is removed, also one
 * whose number now belongs to another program: PostgreSQL itself would refuse to start on it.
 */
export function livingServer(data) {
  const file = path.join(data, 'postmaster.pid');
  if (!fs.existsSync(file)) return undefined;
  const [pid, , , port] = fs.readFileSync(file, 'utf8').split('\n').map(Number);
  if (pid > 0 && isPostgresOn(pid, data)) return {pid, port};
  fs.rmSync(file, {force: true});
  return undefined;
}

/** Stops by fast, then by immediate shutdown; never by SIGKILL, which leaves shared memory behind. */
export async function stopServer(pid, data) {
  for (const [signal, waitMs] of [
    ['SIGINT', 20_000],
    ['SIGQUIT', 10_000],
  ]) {
    try {
      process.kill(pid, signal);
    } catch {
      return; // ESRCH: it has ended
    }
    for (const end = Date.now() + waitMs; Date.now() < end; await sleep(25)) {
      if (!isPostgresOn(pid, data)) return;
    }
  }
  throw new Error(`PostgreSQL (process ${pid}) did not stop.`);
}

function writePassword(folder, user) {
  const secret = path.join(folder, 'password');
  fs.writeFileSync(secret, randomBytes(18).toString('hex'), {mode: 0o600});
  if (user.uid !== undefined) fs.chownSync(secret, user.uid, user.gid);
  return secret;
}

async function spawnServer({programs, folder, user, ephemeral, log, port}) {
  const out = fs.openSync(log, 'a', 0o600);
  if (user.uid !== undefined) fs.fchownSync(out, user.uid, user.gid);
  const child = spawn(
    path.join(programs, 'postgres'),
    // No Unix socket: no limit on its path's length and no folder in /run to be allowed into.
    [
      '-D',
      path.join(folder, 'data'),
      '-p',
      String(port),
      '-c',
      'listen_addresses=127.0.0.1',
    ].concat('-c', 'unix_socket_directories=', ephemeral ? EPHEMERAL : []),
    // Detached: Ctrl-C reaches only the one who started it, who stops the program before its database.
    {...user, cwd: folder, env: cleanEnvironment(), stdio: ['ignore', out, out], detached: true},
  );
  fs.closeSync(out);
  await new Promise((resolve, reject) => child.once('spawn', resolve).once('error', reject));
  return child;
}

/** By /proc/<pid>/cmdline, which everybody may read, unlike its exe and cwd. */
function isPostgresOn(pid, data) {
  try {
    const said = fs.readFileSync(`/proc/${pid}/cmdline`, 'utf8').split('\0');
    return path.basename(said[0] ?? '').startsWith('postgres') && said.includes(data);
  } catch {
    return false; // ENOENT: gone
  }
}
