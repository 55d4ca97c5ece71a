// npm run dev: the database, server and worker that restart when their sources change, and ng serve that reloads.
import fs from 'node:fs';
import path from 'node:path';
import {runChild, startChild} from './children.mjs';
import {checkNode, installModules, ROOT} from './modules.mjs';
import {startPostgres} from './pg.mjs';
import {portIsFree} from './ports.mjs';
import {makeRunFolder, sessionSecret} from './start/run-folder.mjs';

/** Where ng serve listens; it passes /api on to the server's port of proxy.conf.json. */
const PAGE_PORT = 4200;
const proxy = JSON.parse(fs.readFileSync(new URL('proxy.conf.json', import.meta.url), 'utf8'));
const SERVER_PORT = Number(new URL(proxy['/api'].target).port);
const WATCH = ['--watch', '--watch-preserve-output', '--import', 'tsx'];

const started = [];
let stopping;

async function start() {
  checkNode();
  await installModules();
  for (const port of [PAGE_PORT, SERVER_PORT]) {
    if (!(await portIsFree(port))) throw new Error(`Port ${port} is taken; npm run dev needs it.`);
  }
  const own = process.env.DATABASE_URL ? undefined : await startPostgres();
  if (own) started.push(() => own.stop());
  const env = {
    ...process.env,
    ...(own && {DATABASE_URL: own.serverUrl, DATABASE_OWNER_URL: own.url, DEMO: '1'}),
    PORT: String(SERVER_PORT),
    SESSION_SECRET: process.env.SESSION_SECRET ?? sessionSecret(makeRunFolder()),
    PUBLIC_URL: `http://127.0.0.1:${PAGE_PORT}`,
    NODE_ENV: 'development',
    NG_CLI_ANALYTICS: 'false',
  };
  if (own) {
    const seed = ['--import', 'tsx', 'server/seed.ts'];
    console.log(await runChild(process.execPath, seed, {cwd: ROOT, env}));
  }
  const ng = path.join('node_modules', '@angular', 'cli', 'bin', 'ng.js');
  const programs = {
    server: [...WATCH, 'server/main.ts'],
    worker: [...WATCH, 'server/worker.ts'],
    page: [ng, 'serve', '--port', String(PAGE_PORT)],
  };
  for (const [name, words] of Object.entries(programs)) {
    const child = await startChild(process.execPath, words, {cwd: ROOT, env});
    started.push(() => child.stop());
    void child.ended.then(() => {
      if (!stopping) console.error(`The ${name} ended.`);
      void stopAll(1);
    });
  }
}

function stopAll(code) {
  stopping ??= (async () => {
    for (const undo of started.splice(0).reverse()) await undo();
    process.exit(code);
  })();
  return stopping;
}

for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => void stopAll(0));
start().catch((error) => {
  console.error(error.message);
  void stopAll(1);
});
