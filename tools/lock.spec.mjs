/* global describe, it, expect, beforeEach, afterEach */
import {spawn} from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import {isAlive, nameOfProcess, readLock, tryLock} from './lock.mjs';

describe('a lock file', () => {
  let folder;
  let file;
  beforeEach(() => {
    folder = fs.mkdtempSync(path.join(os.tmpdir(), 'lock-'));
    file = path.join(folder, 'lock');
  });
  afterEach(() => fs.rmSync(folder, {recursive: true}));

  it('is held by one at a time and free after release', () => {
    const first = tryLock(file);
    const second = tryLock(file);
    first.release();
    const third = tryLock(file);

    expect(second).toBeUndefined();
    expect(third).toBeDefined();
  });

  it('says who holds it and what the holder noted', () => {
    tryLock(file).note('http://127.0.0.1:1/');

    expect(readLock(file)).toEqual({
      name: nameOfProcess(),
      pid: process.pid,
      note: 'http://127.0.0.1:1/',
    });
  });

  it('of a process that ended is taken over', async () => {
    const child = spawn(process.execPath, ['-e', 'setTimeout(() => {}, 60000)']);
    const name = nameOfProcess(child.pid);
    fs.writeFileSync(file, `${name}\n`);
    const whileItLives = tryLock(file);
    child.kill('SIGKILL');
    await new Promise((resolve) => child.once('exit', resolve));

    const afterwards = tryLock(file);

    expect(whileItLives).toBeUndefined();
    expect(afterwards).toBeDefined();
    expect(fs.readdirSync(folder)).toEqual(['lock']);
  });

  it('whose number now belongs to another process is taken over', () => {
    fs.writeFileSync(file, `${process.pid} 1\n`); // same number, other start time

    expect(tryLock(file)).toBeDefined();
  });

  it('with nonsense in it is taken over', () => {
    fs.writeFileSync(file, 'half a li');

    expect(isAlive('half a li')).toBeFalse();
    expect(tryLock(file)).toBeDefined();
  });
});
