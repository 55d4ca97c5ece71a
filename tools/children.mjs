// Child processes that are always waited for and always stopped. Plain Node.
import {spawn} from 'node:child_process';
import fs from 'node:fs';
import {setTimeout as sleep} from 'node:timers/promises';

const running = new Set();

/** Runs a program to its end and resolves to what it wrote; throws with the end of it when it fails. */
export async function runChild(program, words, {cwd, env, show = false} = {}) {
  const {code, signal, output} = await watchChild(program, words, {cwd, env, show});
  if (code === 0) return output;
  const why = signal ? `was ended by ${signal}` : `ended with code ${code}`;
  const end = show ? '' : `:\n${output.trimEnd().split('\n').slice(-60).join('\n')}`;
  throw new Error(`${[program, ...words].join(' ')} ${why}${end}`);
}

/** Runs a program to its end; resolves to `{code, signal, output}`. `show` passes its output on at once as well. */
export function watchChild(program, words, {cwd, env, show = false} = {}) {
  const child = spawn(program, words, {
    cwd,
    env: env ?? process.env,
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  running.add(child);
  const parts = [];
  const take = (target) => (chunk) => {
    parts.push(chunk);
    if (show) target.write(chunk);
  };
  child.stdout.on('data', take(process.stdout));
  child.stderr.on('data', take(process.stderr));
  return new Promise((resolve) => {
    const end = (result) => {
      running.delete(child);
      resolve({...result, output: Buffer.concat(parts).toString('utf8')});
    };
    child.once('error', (error) => {
      parts.push(Buffer.from(`${error.message}\n`));
      end({code: 127, signal: null});
    });
    child.once('close', (code, signal) => end({code, signal}));
  });
}

/**
 * Starts a program that stays, in a process group of its own, so that Ctrl-C reaches only the one who started it.
 * Its output goes to the file `log`, or is shown. Resolves to `{pid, ended, stop}`.
 */
export async function startChild(program, words, {cwd, env, log}) {
  const out = log ? fs.openSync(log, 'a', 0o600) : 'inherit';
  const child = spawn(program, words, {cwd, env, stdio: ['ignore', out, out], detached: true});
  if (log) fs.closeSync(out);
  const ended = new Promise((resolve) => {
    child.once('exit', (code, signal) => resolve({code, signal}));
    child.once('error', (error) => resolve({code: 127, signal: null, error}));
  });
  await new Promise((resolve) => child.once('spawn', resolve).once('error', resolve));
  return {pid: child.pid, ended, stop: (waitMs) => stopGroup(child.pid, ended, waitMs)};
}

/** Asks the program by SIGTERM, insists by SIGKILL after `waitMs`; its own children end with it. */
async function stopGroup(pid, ended, waitMs = 15_000) {
  if (pid === undefined) return;
  try {
    process.kill(pid, 'SIGTERM'); // not its group: it ends its children itself, in its order
  } catch {
    // ESRCH: it has ended
  }
  const late = Symbol('late');
  if ((await Promise.race([ended, sleep(waitMs, late, {ref: false})])) === late) {
    signalGroup(pid, 'SIGKILL');
    await ended;
  }
  signalGroup(pid, 'SIGKILL'); // what it left
}

/** Sends a signal to a process group that `startChild` made; harmless when it has ended. */
export function signalGroup(pid, signal) {
  try {
    process.kill(-pid, signal);
  } catch {
    // ESRCH: it has ended
  }
}

/** Ends what `runChild` and `watchChild` still have running. */
export function endChildren(signal = 'SIGTERM') {
  for (const child of running) child.kill(signal);
}
