// The checks of test:fresh. Runs as the first process of its own namespaces; argument: the folder with the Debian.
import {spawn, spawnSync} from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import {setTimeout as sleep} from 'node:timers/promises';
import {CLONE, npmEnvironment} from './make-debian.mjs';

const [folder] = process.argv.slice(2);
const ENVIRONMENT = {
  PATH: '/usr/local/sbin:/usr/local/bin:/usr/sbin:/usr/bin:/sbin:/bin',
  LANG: 'C.UTF-8',
  ...npmEnvironment(),
};
/** The first start installs and builds. */
const FIRST_START_MS = 900_000;
const SECOND_START_MS = 5_000;
const USER_CLONE = '/home/visitor/evenspan';
const counts = {passed: 0, failed: 0};

function check(what, holds, detail = '') {
  counts[holds ? 'passed' : 'failed']++;
  console.log(`${holds ? '✓' : '✗'} ${what}${holds || !detail ? '' : `\n${detail}`}`);
}

function mount(...words) {
  const done = spawnSync('mount', words, {encoding: 'utf8'});
  if (done.status !== 0) throw new Error(`mount ${words.join(' ')}: ${done.stderr}`);
}

/** Runs a command inside to its end. */
function inside(words, {user = 'root', at = CLONE, env = {}} = {}) {
  const home = user === 'root' ? '/root' : `/home/${user}`;
  return spawnSync('chroot', [`--userspec=${user}`, folder, '/usr/bin/env', '-C', at, ...words], {
    env: {...ENVIRONMENT, HOME: home, ...env},
    encoding: 'utf8',
    maxBuffer: 256 * 1024 * 1024,
  });
}

/** Starts npm start inside, asks its page, ends it as Ctrl-C does, and looks for what is left. */
async function startAndStop(what, {user = 'root', at = CLONE, withinMs}) {
  const startedAt = Date.now();
  const home = user === 'root' ? '/root' : `/home/${user}`;
  const child = spawn(
    'chroot',
    [`--userspec=${user}`, folder, '/usr/bin/env', '-C', at, 'npm', 'start'],
    {
      env: {...ENVIRONMENT, HOME: home},
      detached: true, // a group of its own, which gets the signal as a terminal's would
      stdio: ['ignore', 'pipe', 'pipe'],
    },
  );
  let said = '';
  for (const stream of [child.stdout, child.stderr]) stream.on('data', (chunk) => (said += chunk));
  const ended = new Promise((resolve) => child.once('exit', resolve));
  let url;
  while (!url && child.exitCode === null && Date.now() - startedAt < withinMs) {
    await sleep(50);
    url = /ready: (http:\/\/\S+)/.exec(said)?.[1];
  }
  const tookS = (Date.now() - startedAt) / 1000;
  check(`${what}: ready (${tookS.toFixed(1)} s)`, url !== undefined, said);
  if (url) check(`${what}: its page answers 200`, (await fetch(url)).status === 200);
  if (child.exitCode === null) process.kill(-child.pid, 'SIGINT');
  await Promise.race([ended, sleep(30_000)]);
  await sleep(200);
  const left = othersRunning();
  check(`${what}: Ctrl-C stops everything`, left.length === 0, left.join('\n'));
  for (const line of left) process.kill(Number(line.split(' ')[0]), 'SIGKILL');
  return said;
}

/** Living processes of this namespace but this one. */
function othersRunning() {
  return fs
    .readdirSync('/proc')
    .filter((name) => /^\d+$/.test(name) && Number(name) !== process.pid)
    .flatMap((pid) => {
      try {
        const state = /\) (\w)/.exec(fs.readFileSync(`/proc/${pid}/stat`, 'utf8'))?.[1];
        const command = fs
          .readFileSync(`/proc/${pid}/cmdline`, 'utf8')
          .replaceAll('\0', ' ')
          .trim();
        return state === 'Z' ? [] : [`${pid} ${command}`];
      } catch {
        return []; // ENOENT: ended meanwhile
      }
    });
}

async function checkAll() {
  mount('-t', 'proc', 'proc', '/proc');
  mount('-t', 'proc', 'proc', path.join(folder, 'proc'));
  mount('--bind', '/dev', path.join(folder, 'dev'));
  mount('-t', 'tmpfs', 'tmpfs', path.join(folder, 'dev/shm'));
  inside(['useradd', '--create-home', 'visitor'], {at: '/'});

  const before = fs.readdirSync(path.join(folder, CLONE)).join();
  inside(['chown', '-R', 'visitor:', CLONE], {at: '/'});
  const refused = inside(['npm', 'start'], {user: 'visitor'});
  check(
    'npm start as an ordinary user names the command that is missing',
    refused.status !== 0 && refused.stdout.concat(refused.stderr).includes('apt-get install'),
    `${refused.stdout}${refused.stderr}`,
  );
  check('… and changes nothing', fs.readdirSync(path.join(folder, CLONE)).join() === before);
  inside(['chown', '-R', 'root:', CLONE], {at: '/'});

  const said = await startAndStop('first npm start', {withinMs: FIRST_START_MS});
  console.log(said.trimEnd().replace(/^/gm, '    '));
  await startAndStop('second npm start', {withinMs: SECOND_START_MS});

  inside(
    ['sh', '-c', `cp -a ${CLONE} ${USER_CLONE} && rm -rf ${USER_CLONE}/.pg ${USER_CLONE}/.run`],
    {at: '/'},
  );
  inside(['chown', '-R', 'visitor:', USER_CLONE], {at: '/'});
  await startAndStop('npm start as an ordinary user', {
    user: 'visitor',
    at: USER_CLONE,
    withinMs: 60_000,
  });

  const tested = inside(['npm', 'test'], {env: {CI: 'true'}});
  const last = tested.stdout.trimEnd().split('\n').at(-1) ?? '';
  const sum = /^(\d+) passed, (\d+) failed$/.exec(last);
  console.log(tested.stdout.trimEnd().replace(/^/gm, '    '));
  check(
    'npm test passes and ends with its counts',
    tested.status === 0 && sum !== null,
    tested.stderr,
  );
  if (sum) {
    counts.passed += Number(sum[1]);
    counts.failed += Number(sum[2]);
  }
}

try {
  await checkAll();
} catch (error) {
  check('test:fresh itself', false, error.stack);
}
console.log(`${counts.passed} passed, ${counts.failed} failed`);
process.exit(counts.failed === 0 && counts.passed > 0 ? 0 : 1);
