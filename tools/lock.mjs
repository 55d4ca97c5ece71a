// Files that say which process holds something. Plain Node: runs before node_modules exist.
import fs from 'node:fs';
import path from 'node:path';
import {setTimeout as sleep} from 'node:timers/promises';

/** A process by number and start time [clock ticks since boot], so that a number used again is not taken for it. */
export function nameOfProcess(pid = process.pid) {
  try {
    const stat = fs.readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The command in brackets may hold blanks; the state comes after it, the start time as 20th.
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    return 'ZX'.includes(fields[0]) ? undefined : `${pid} ${fields[19]}`; // ended, only not yet collected
  } catch {
    return undefined; // ENOENT: no such process
  }
}

/** Whether the process that a lock or user file names still lives. */
export function isAlive(name) {
  const pid = Number(name.split(' ')[0]);
  return Number.isInteger(pid) && pid > 0 && nameOfProcess(pid) === name.trim();
}

/** What a lock file says: `{name, pid, note}`, or undefined when nobody alive holds it. */
export function readLock(file) {
  let text;
  try {
    text = fs.readFileSync(file, 'utf8');
  } catch {
    return undefined; // ENOENT: free
  }
  const [name = '', ...note] = text.split('\n');
  if (!isAlive(name)) return undefined;
  return {name, pid: Number(name.split(' ')[0]), note: note.join('\n').trim()};
}

/** Takes the lock and returns `{release, note}`, or undefined when a living process holds it. */
export function tryLock(file) {
  const own = nameOfProcess();
  const draft = `${file}.${process.pid}`;
  fs.writeFileSync(draft, `${own}\n`);
  try {
    for (let tries = 0; tries < 10; tries++) {
      try {
        fs.linkSync(draft, file); // a link appears whole or not at all
        return held(file, own);
      } catch (error) {
        if (error.code !== 'EEXIST') throw error;
      }
      if (readLock(file)) return undefined;
      setAside(file);
    }
    return undefined;
  } finally {
    fs.rmSync(draft, {force: true});
  }
}

/** Waits for the lock at most `waitMs`. */
export async function lock(file, waitMs = 90_000) {
  for (const end = Date.now() + waitMs; Date.now() < end; await sleep(100)) {
    const taken = tryLock(file);
    if (taken) return taken;
  }
  const holder = readLock(file);
  throw new Error(`${path.basename(file)} has been held by process ${holder?.pid} for too long.`);
}

function held(file, own) {
  return {
    release: () => fs.rmSync(file, {force: true}),
    note: (text) => fs.writeFileSync(file, `${own}\n${text}\n`),
  };
}

/** Removes a dead holder's file; by rename, so that of two who try only one removes what it looked at. */
function setAside(file) {
  const dead = `${file}.dead-${process.pid}`;
  try {
    fs.renameSync(file, dead);
  } catch {
    return; // ENOENT: the other was faster
  }
  const name = fs.readFileSync(dead, 'utf8').split('\n')[0] ?? '';
  if (isAlive(name)) {
    try {
      fs.linkSync(dead, file); // a living one had just taken it: put it back
    } catch {
      // EEXIST: a third took it meanwhile
    }
  }
  fs.rmSync(dead, {force: true});
}
