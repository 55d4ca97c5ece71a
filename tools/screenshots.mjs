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
/** How long the line runs before the picture is taken [ms]: started, run and with a change of set point seen. */
const RUN_MS = 20_000;
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
  await seedOnce(env);
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
    const page = await context.newPage();
    await signIn(page);
    await page.goto(at);
    await page.waitForLoadState('networkidle');
    await press?.(page);
    await page.screenshot({path: path.join(FOLDER, file)});
    console.log(`docs/screenshots/${file}`);
    await context.close();
  }
}

/** As the first trainee whom the sign-in page offers, whose password the seed prints and the page fills in. */
async function signIn(page) {
  await page.goto('/');
  await page
    .getByRole('button', {name: /trainee/i})
    .first()
    .click();
  const enter = page.getByRole('button', {name: /^sign in$/i});
  if (await enter.isVisible()) await enter.click();
  await page.waitForURL((address) => !address.pathname.includes('sign-in'));
}

async function runTheLine(page) {
  await page
    .getByRole('button', {name: /^(start|run)/i})
    .first()
    .click();
  await page.waitForTimeout(RUN_MS);
}
