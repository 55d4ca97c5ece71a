/* global describe, it, expect, beforeEach, afterEach, beforeAll, afterAll */
import {spawn, spawnSync} from 'node:child_process';
import fs from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import {startPostgres} from './pg.mjs';
import {livingServer} from './postgres/cluster.mjs';
import {ROOT} from './modules.mjs';

const SCRIPT = path.join(ROOT, 'tools', 'pg.mjs');

describe('a private cluster', () => {
  const before = process.env.PG_DIR;
  let base;
  let data;
  let said;
  const start = (options = {}) =>
    startPostgres({sub: 'spec', ephemeral: true, say: (line) => said.push(line), ...options});

  let pattern; // a cluster once made, copied where a spec needs one: initdb takes a second
  beforeAll(async () => {
    pattern = newFolder();
    process.env.PG_DIR = pattern;
    await (await startPostgres({sub: 'spec'})).stop();
    restore();
  });
  afterAll(() => fs.rmSync(pattern, {recursive: true}));
  beforeEach(() => {
    base = newFolder();
    process.env.PG_DIR = base;
    data = path.join(base, 'spec', 'data');
    said = [];
  });
  afterEach(() => {
    restore();
    fs.rmSync(base, {recursive: true, force: true});
  });

  const copy = (sub = 'spec') =>
    spawnSync('cp', ['-a', path.join(pattern, 'spec'), path.join(base, sub)]);
  const restore = () => {
    if (before === undefined) delete process.env.PG_DIR;
    else process.env.PG_DIR = before;
  };

  it('answers on its address and is gone after stop', async () => {
    const cluster = await start();
    const answer = ask(cluster.url, 'select 40 + 2');

    await cluster.stop();

    expect(answer).toBe('42');
    expect(livingServer(data)).toBeUndefined();
  });

  it('keeps what was stored, on the same port, over a restart', async () => {
    copy();
    const first = await start({ephemeral: false});
    ask(first.url, 'create table kept (x int)');
    await first.stop();

    const second = await start({ephemeral: false});
    const count = ask(second.url, 'select count(*) from kept');
    await second.stop();

    expect(count).toBe('0');
    expect(second.port).toBe(first.port);
  });

  it('is empty again when it is a test cluster', async () => {
    const first = await start();
    ask(first.url, 'create table gone (x int)');
    await first.stop();

    const second = await start();
    const tables = ask(second.url, "select count(*) from pg_tables where tablename = 'gone'");
    await second.stop();

    expect(tables).toBe('0');
  });

  it('takes another port when its own is taken', async () => {
    copy();
    const first = await start({ephemeral: false});
    await first.stop();
    const other = net.createServer().listen(first.port, '127.0.0.1');
    await new Promise((resolve) => other.once('listening', resolve));

    const second = await start({ephemeral: false});
    await second.stop();
    await new Promise((resolve) => other.close(resolve));

    expect(second.port).not.toBe(first.port);
  });

  it('sets a half-made folder aside, says so and starts', async () => {
    const folder = path.join(base, 'spec');
    fs.mkdirSync(path.join(data, 'base'), {recursive: true});
    fs.writeFileSync(path.join(data, 'PG_VERSION'), '15\n');

    const cluster = await start({ephemeral: false});
    await cluster.stop();

    expect(said.join()).toContain('half made');
    expect(fs.readdirSync(folder).filter((name) => name.startsWith('data.half-made'))).toHaveSize(
      1,
    );
  });

  it('starts over a pid file whose process is another program', async () => {
    copy();
    fs.writeFileSync(
      path.join(data, 'postmaster.pid'),
      `${process.pid}\n${data}\n1\n1\n\n127.0.0.1\n`,
    );

    const cluster = await start({ephemeral: false});
    const answer = ask(cluster.url, 'select 1');
    await cluster.stop();

    expect(answer).toBe('1');
  });

  it('gets a new password when the old one is lost', async () => {
    copy();
    fs.rmSync(path.join(base, 'spec', 'password'));

    const cluster = await start({ephemeral: false});
    const answer = ask(cluster.url, 'select 1');
    await cluster.stop();

    expect(answer).toBe('1');
  });

  it('is shared by two that start at once and stopped by the last', async () => {
    const run = (seconds) =>
      new Promise((resolve) => {
        const words = [
          SCRIPT,
          'run',
          '--ephemeral',
          '--',
          'sh',
          '-c',
          `sleep ${seconds}; psql $DATABASE_URL -Atc 'select 7'`,
        ];
        let output = '';
        const child = spawn(process.execPath, words);
        child.stdout.on('data', (chunk) => (output += chunk));
        child.once('close', (code) => resolve({code, output: output.trim()}));
      });

    const [short, long] = await Promise.all([run(0), run(2)]);

    expect(short).toEqual({code: 0, output: '7'});
    expect(long).toEqual({code: 0, output: '7'});
    expect(livingServer(path.join(base, 'test', 'data'))).toBeUndefined();
  });

  it('is taken over after its starter was killed', async () => {
    copy('dev');
    const child = spawn(process.execPath, [SCRIPT, 'run', '--', 'sleep', '60'], {detached: true});
    const kept = path.join(base, 'dev', 'data');
    const users = path.join(base, 'dev', 'users');
    while (!fs.existsSync(users) || fs.readdirSync(users).length === 0) await pause();
    process.kill(-child.pid, 'SIGKILL');

    const cluster = await start({sub: 'dev', ephemeral: false});
    const answer = ask(cluster.url, 'select 1');
    await cluster.stop();

    expect(cluster.started).toBeFalse();
    expect(answer).toBe('1');
    expect(livingServer(kept)).toBeUndefined();
  });
});

function ask(url, sql) {
  const asked = spawnSync('psql', [url, '-XAtc', sql], {encoding: 'utf8'});
  return asked.stdout.trim() || asked.stderr;
}

function newFolder() {
  const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'pg-spec-'));
  fs.chmodSync(folder, 0o755); // the server's user must get in
  return folder;
}

function pause() {
  return new Promise((resolve) => setTimeout(resolve, 50));
}
