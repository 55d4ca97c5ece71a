// npm start: installs what is missing, builds what changed, runs the database, one server and one worker until
// Ctrl-C. Plain Node: runs on a fresh machine, before node_modules exist.
import path from 'node:path';
import {build} from './build.mjs';
import {endChildren} from './children.mjs';
import {checkMayInstall, installPostgres} from './debian.mjs';
import {nameOfProcess, readLock, tryLock} from './lock.mjs';
import {checkNode, installModules, ROOT} from './modules.mjs';
import {startPostgres} from './pg.mjs';
import {findPrograms, PostgresMissingError} from './postgres/place.mjs';
import {choosePort} from './start/choose-port.mjs';
import {makeRunFolder, sessionSecret} from './start/run-folder.mjs';
import {seedOnce, startProgram, stopLeftovers, waitUntilReady} from './start/programs.mjs';

/** What has been started, undone in reverse order. */
const started = [];
let stopping;

async function start() {
  checkNode();
  const bringsDatabase = !process.env.DATABASE_URL;
  const needsPostgres = bringsDatabase && !postgresIsInstalled();
  if (needsPostgres) checkMayInstall('PostgreSQL', ['postgresql']); // before anything is changed

  const run = makeRunFolder();
  const file = path.join(run, 'start.lock');
  const hold = tryLock(file);
  if (!hold) return sayWhoRuns(file);
  started.push(() => hold.release());

  await stopLeftovers(run);
  const port = await choosePort(process.env.PORT); // a wrong one is told before the long work
  if (needsPostgres) installPostgres();
  await installModules();
  await build();

  const postgres = bringsDatabase ? await ownDatabase() : undefined;
  const url = `http://127.0.0.1:${port}/`;
  const env = {
    ...process.env,
    PORT: String(port),
    SESSION_SECRET: process.env.SESSION_SECRET || sessionSecret(run),
    NODE_ENV: 'production',
    ...(postgres && {
      DATABASE_URL: postgres.serverUrl,
      DATABASE_OWNER_URL: postgres.url,
      DEMO: '1',
    }),
  };
  const programs = [];
  for (const name of ['worker', 'server']) {
    const program = await startProgram(name, {env, run});
    programs.push(program);
    started.push(() => program.stop());
  }
  const seeded = postgres && seedOnce(env, postgres.dir);
  const [accounts] = await Promise.all([seeded, waitUntilReady(url, programs)]);
  hold.note(url);
  sayReady(url, accounts);
  void Promise.race(programs.map((program) => program.failed)).then((why) => fail(why));
}

async function ownDatabase() {
  const postgres = await startPostgres({say: console.log});
  started.push(() => postgres.stop());
  const name = nameOfProcess(postgres.pid);
  const watch = setInterval(() => {
    if (nameOfProcess(postgres.pid) !== name)
      fail(`PostgreSQL ended; see ${postgres.dir}/server.log`);
  }, 1_000);
  started.push(() => clearInterval(watch));
  return postgres;
}

function postgresIsInstalled() {
  try {
    findPrograms();
    return true;
  } catch (error) {
    if (error instanceof PostgresMissingError) return false;
    throw error;
  }
}

function sayWhoRuns(file) {
  const holder = readLock(file);
  if (holder?.note) console.log(`Evenspan already runs at ${holder.note} (process ${holder.pid}).`);
  else console.log(`Evenspan is being started already (process ${holder?.pid ?? 'unknown'}).`);
}

function sayReady(url, accounts) {
  console.log(`\nEvenspan is ready: ${url}`);
  if (accounts) console.log(`\nDemo accounts:\n${accounts}`);
  console.log('\nCtrl-C stops everything.');
}

function fail(why) {
  if (stopping) return;
  console.error(why);
  void stopAll(1);
}

/** Stops in reverse order of starting, once, whoever asks. */
function stopAll(code) {
  stopping ??= (async () => {
    endChildren();
    for (const undo of started.splice(0).reverse()) await undo();
    process.exit(code);
  })().catch((error) => {
    console.error(error.message);
    process.exit(1);
  });
  return stopping;
}

for (const stream of [process.stdout, process.stderr]) {
  stream.on('error', () => {}); // EIO, EPIPE: the terminal was closed; stopping goes on
}
for (const [signal, code] of [
  ['SIGINT', 130],
  ['SIGTERM', 143],
  ['SIGHUP', 129],
]) {
  process.on(signal, () => {
    if (!stopping) console.log('\nStopping.');
    void stopAll(code);
  });
}
start().catch((error) => {
  if (stopping) return;
  const isForeign = error.code === 'EACCES' || error.code === 'EPERM';
  fail(
    isForeign
      ? `${path.relative(ROOT, error.path ?? '') || error.path} belongs to another user; start as that user.`
      : error.message,
  );
});
