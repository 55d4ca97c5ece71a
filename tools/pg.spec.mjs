/* global describe, it, expect, beforeEach, beforeAll, afterEach, afterAll */
import {spawn, spawnSync} from 'node:child_process';
import fs from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import {ROOT} from './modules.mjs';
import {startPostgres} from './pg.mjs';
import {livingServer} from './postgres/cluster.mjs';

const SCRIPT = path.join(ROOT, 'tools', 'pg.mjs');

describe('a private cluster', () => {
  const before = process.env.PG_DIR;
  const said = [];
  let base;
  const place = (...names) => path.join(base, ...names);
  const start = (options) =>
    startPostgres({sub: 'kept', say: (line) => said.push(line), ...options});

  // One folder for all specs, since making a cluster is what takes time; none relies on what another left in it.
  beforeAll(() => {
    base = fs.mkdtempSync(path.join(os.tmpdir(), 'pg-spec-'));
    fs.chmodSync(base, 0o755); // the server's user must get in
  });
  beforeEach(() => (process.env.PG_DIR = base));
  afterEach(() => {
    if (before === undefined) delete process.env.PG_DIR;
    else process.env.PG_DIR = before;
  });
  afterAll(() => fs.rmSync(base, {recursive: true, force: true}));

  it('answers, is gone after stop, and keeps what was stored and its port over a restart', async () => {
    const first = await start();
    ask(first.url, 'create table kept (x int)');
    await first.stop();
    const meanwhile = livingServer(place('kept', 'data'));

    const second = await start();
    const count = ask(second.url, 'select count(*) from kept');
    await second.stop();

    expect(meanwhile).toBeUndefined();
    expect(count).toBe('0');
    expect(second.port).toBe(first.port);
  });

  it('is empty again when it is a test cluster', async () => {
    const options = {sub: 'emptied', ephemeral: true};
    const first = await start(options);
    ask(first.url, 'create table gone (x int)');
    await first.stop();

    const second = await start(options);
    const tables = ask(second.url, "select count(*) from pg_tables where tablename = 'gone'");
    await second.stop();

    expect(tables).toBe('0');
  });

  it('takes another port when its own is taken', async () => {
    const first = await start();
    await first.stop();
    const other = net.createServer().listen(first.port, '127.0.0.1');
    await new Promise((resolve) => other.once('listening', resolve));

    const second = await start();
    await second.stop();
    await new Promise((resolve) => other.close(resolve));

    expect(second.port).not.toBe(first.port);
  });

  it('sets a half-made folder aside, says so and starts', async () => {
    fs.mkdirSync(place('half', 'data', 'base'), {recursive: true});
    fs.writeFileSync(place('half', 'data', 'PG_VERSION'), '15\n');

    const cluster = await start({sub: 'half'});
    await cluster.stop();

    expect(said.join()).toContain('half made');
    expect(fs.readdirSync(place('half')).join()).toContain('data.half-made-');
  });

  it('starts over a pid file whose process is another program', async () => {
    await (await start()).stop();
    const data = place('kept', 'data');
    fs.writeFileSync(
      path.join(data, 'postmaster.pid'),
      `${process.pid}\n${data}\n1\n1\n\n127.0.0.1\n`,
    );

    const cluster = await start();
    const answer = ask(cluster.url, 'select 1');
    await cluster.stop();

    expect(answer).toBe('1');
  });

  it('gets a new password when the old one is lost', async () => {
    await (await start()).stop();
    fs.rmSync(place('kept', 'password'));

    const cluster = await start();
    const answer = ask(cluster.url, 'select 1');
    await cluster.stop();

    expect(answer).toBe('1');
  });

  it('is shared by two that start at once and stopped by the last', async () => {
    const run = (seconds) =>
      new Promise((resolve) => {
        const command = `sleep ${seconds}; psql $DATABASE_URL -Atc 'select 7'`;
        const child = spawn(process.execPath, [
          SCRIPT,
          'run',
          '--ephemeral',
          '--',
          'sh',
          '-c',
          command,
        ]);
        let output = '';
        child.stdout.on('data', (chunk) => (output += chunk));
        child.once('close', (code) => resolve({code, output: output.trim()}));
      });

    const [short, long] = await Promise.all([run(0), run(2)]);

    expect(short).toEqual({code: 0, output: '7'});
    expect(long).toEqual({code: 0, output: '7'});
    expect(livingServer(place('test', 'data'))).toBeUndefined();
  });

  it('is taken over, and stopped in the end, after its starter was killed', async () => {
    const child = spawn(process.execPath, [SCRIPT, 'run', '--', 'sleep', '60'], {detached: true});
    const users = place('dev', 'users');
    while (!fs.existsSync(users) || fs.readdirSync(users).length === 0) await pause();
    process.kill(-child.pid, 'SIGKILL');

    const cluster = await start({sub: 'dev'});
    const answer = ask(cluster.url, 'select 1');
    await cluster.stop();

    expect(cluster.started).toBeFalse();
    expect(answer).toBe('1');
    expect(livingServer(place('dev', 'data'))).toBeUndefined();
  });
});

function ask(url, sql) {
  const asked = spawnSync('psql', [url, '-XAtc', sql], {encoding: 'utf8'});
  return asked.stdout.trim() || asked.stderr;
}

function pause() {
  return new Promise((resolve) => setTimeout(resolve, 50));
}
