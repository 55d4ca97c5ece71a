// The server and the worker of one npm start.
import fs from 'node:fs';
import path from 'node:path';
import {setTimeout as sleep} from 'node:timers/promises';
import {runChild, signalGroup, startChild} from '../children.mjs';
import {isAlive, nameOfProcess} from '../lock.mjs';
import {ROOT} from '../modules.mjs';

/** Which built file each program is. */
const FILES = {server: 'main.js', worker: 'worker.js'};
const READY_WITHIN_MS = 60_000;
const LOG_LIMIT_BYTES = 10 * 1024 * 1024;

/** Starts one of the two programs; `failed` resolves to one clear text when it ends by itself. */
export async function startProgram(name, {env, run}) {
  const log = path.join(run, `${name}.log`);
  if (fs.existsSync(log) && fs.statSync(log).size > LOG_LIMIT_BYTES)
    fs.renameSync(log, `${log}.old`);
  const from = fs.existsSync(log) ? fs.statSync(log).size : 0;
  const child = await startChild(
    process.execPath,
    ['--enable-source-maps', path.join('dist', 'server', FILES[name])],
    {cwd: ROOT, env, log},
  );
  const mark = path.join(run, `${name}.process`);
  const own = nameOfProcess(child.pid);
  if (own) fs.writeFileSync(mark, own);
  const failed = child.ended.then(({code, signal, error}) => {
    const how = error?.message ?? (signal ? `by ${signal}` : `with code ${code}`);
    const end = fs
      .readFileSync(log)
      .subarray(from)
      .toString('utf8')
      .trimEnd()
      .split('\n')
      .slice(-15);
    return `The ${name} ended ${how}; everything is stopped. The end of ${path.relative(ROOT, log)}:\n${end.join('\n')}`;
  });
  const stop = async () => {
    await child.stop();
    fs.rmSync(mark, {force: true});
  };
  return {name, failed, stop};
}

/** Stops what a start that was killed left running. */
export async function stopLeftovers(run) {
  for (const name of ['server', 'worker']) {
    const mark = path.join(run, `${name}.process`);
    if (!fs.existsSync(mark)) continue;
    const left = fs.readFileSync(mark, 'utf8');
    if (isAlive(left)) {
      console.log(`Stopping a ${name} that an earlier start left behind.`);
      await endProcess(left);
    }
    fs.rmSync(mark, {force: true});
  }
}

/** Asks the server until it is ready; throws when a program ends first. */
export async function waitUntilReady(url, programs) {
  let ended;
  for (const program of programs) void program.failed.then((why) => (ended ??= why));
  for (const end = Date.now() + READY_WITHIN_MS; Date.now() < end; await sleep(50)) {
    if (ended) throw new Error(ended);
    try {
      const reply = await fetch(`${url}api/health/ready`, {signal: AbortSignal.timeout(2_000)});
      if (reply.ok) return;
    } catch {
      // TypeError, TimeoutError: it does not listen yet
    }
  }
  throw new Error(
    `The server was not ready within ${READY_WITHIN_MS / 1000} s; see .run/server.log`,
  );
}

/**
 * Seeds the demo into the cluster at `dir` and resolves to the lines that name its accounts. They are kept there, so that
 * this takes no time until the cluster or the built server is another one.
 */
export async function seedOnce(env, dir) {
  const file = path.join(dir, 'seeded.json');
  const {ino, birthtimeMs} = fs.statSync(path.join(dir, 'data'));
  const built = fs.readFileSync(path.join(ROOT, 'dist', 'server.sources'), 'utf8');
  const mark = `${ino} ${birthtimeMs} ${built}`;
  if (fs.existsSync(file)) {
    const kept = JSON.parse(fs.readFileSync(file, 'utf8'));
    if (kept.mark === mark) return kept.accounts;
  }
  const seed = [path.join('dist', 'server', 'seed.js')];
  const accounts = (await runChild(process.execPath, seed, {cwd: ROOT, env})).trimEnd();
  fs.writeFileSync(`${file}.new`, JSON.stringify({mark, accounts}));
  fs.renameSync(`${file}.new`, file);
  return accounts;
}

async function endProcess(name) {
  const pid = Number(name.split(' ')[0]);
  for (const [signal, waitMs] of [
    ['SIGTERM', 15_000],
    ['SIGKILL', 5_000],
  ]) {
    signalGroup(pid, signal);
    for (const end = Date.now() + waitMs; Date.now() < end; await sleep(50)) {
      if (!isAlive(name)) return;
    }
  }
}
