// npm run screenshots: the pictures in docs/screenshots, from the built program on a scratch database.
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import {chromium} from '@playwright/test';
import {build} from './build.mjs';
import {ROOT} from './modules.mjs';
import {startPostgres} from './pg.mjs';
import {freePort} from './ports.mjs';
import {sessionSecret} from './start/run-folder.mjs';
import {seedOnce, startProgram, waitUntilReady} from './start/programs.mjs';

const FOLDER = path.join(ROOT, 'docs', 'screenshots');
const FLAGS = ['--no-sandbox', '--disable-gpu', '--disable-background-networking'];
/** How long the line runs before the picture is taken [ms]: started and at speed. */
const RUN_MS = 25_000;
/** Each picture: who looks at what, how large, how light, and what is pressed first. */
const PICTURES = [
  {file: 'bench.png', at: '/bench', scheme: 'light', width: 1440, height: 900, press: runTheLine},
  {
    file: 'bench-dark.png',
    at: '/bench',
    scheme: 'dark',
    width: 1440,
    height: 900,
    press: runTheLine,
  },
  {file: 'exercises.png', at: '/exercises', scheme: 'light', width: 1440, height: 900},
];

const started = [];
try {
  await build();
  const run = fs.mkdtempSync(path.join(os.tmpdir(), 'evenspan-screenshots-'));
  started.push(() => fs.rmSync(run, {recursive: true, force: true}));
  const postgres = await startPostgres({sub: 'screenshots', ephemeral: true});
  started.push(() => postgres.stop());
  const port = await freePort();
  const url = `http://127.0.0.1:${port}/`;
  const env = {
    ...process.env,
    DATABASE_URL: postgres.serverUrl,
    DATABASE_OWNER_URL: postgres.url,
    PORT: String(port),
    SESSION_SECRET: sessionSecret(run),
    NODE_ENV: 'production',
    DEMO: '1',
  };
  await seedOnce(env, postgres.dir);
  const programs = [];
  for (const name of ['worker', 'server']) {
    const program = await startProgram(name, {env, run});
    programs.push(program);
    started.push(() => program.stop());
  }
  await waitUntilReady(url, programs);
  await takePictures(url);
} finally {
  for (const undo of started.reverse()) await undo();
}

async function takePictures(url) {
  const browser = await chromium.launch({executablePath: '/usr/bin/chromium', args: FLAGS});
  started.push(() => browser.close());
  fs.mkdirSync(FOLDER, {recursive: true});
  for (const {file, at, scheme, width, height, press} of PICTURES) {
    const context = await browser.newContext({
      baseURL: url,
      colorScheme: scheme,
      viewport: {width, height},
      locale: 'en-GB',
      reducedMotion: 'no-preference',
    });
    await signIn(context);
    const page = await context.newPage();
    await page.goto(at);
    await page.getByRole('heading', {level: 1}).waitFor();
    await press?.(page);
    await page.evaluate(() => document.fonts.ready);
    await page.screenshot({path: path.join(FOLDER, file)});
    console.log(`docs/screenshots/${file}`);
    await context.close();
  }
}

/** As the first trainee of the demo, by the call that the sign-in page makes. */
async function signIn({request}) {
  const session = await (await request.get('/api/session')).json();
  const {email, password} = session.demoAccounts.find(({role}) => role === 'trainee');
  const {cookies} = await request.storageState();
  const token = cookies.find(({name}) => name.endsWith('XSRF-TOKEN')).value;
  const headers = {'X-XSRF-TOKEN': token};
  const reply = await request.post('/api/session', {data: {email, password}, headers});
  if (!reply.ok()) throw new Error(`Sign-in failed: ${await reply.text()}`);
}

async function runTheLine(page) {
  await page.getByRole('button', {name: 'Start the line'}).click();
  await page.waitForTimeout(RUN_MS);
}
