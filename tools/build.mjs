// Builds the client and the server into dist/, each only when its sources changed.
//   node tools/build.mjs [--force]
import {createHash} from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import {fileURLToPath} from 'node:url';
import {checkBudget} from './budget.mjs';
import {runChild} from './children.mjs';
import {lock} from './lock.mjs';
import {ROOT} from './modules.mjs';

const DIST = path.join(ROOT, 'dist');
const BOTH = ['sim-core', 'shared', 'package.json', 'package-lock.json', 'tsconfig.base.json'];
/** What each half is made from. */
const SOURCES = {
  client: [
    ...BOTH,
    'src',
    'angular.json',
    'ngsw-config.json',
    'tsconfig.app.json',
    'tsconfig.worker.json',
  ],
  server: [...BOTH, 'server', 'tsconfig.json', 'tools/build.mjs'],
};

/** Builds what is not up to date. */
export async function build({force = false, say = console.log} = {}) {
  fs.mkdirSync(DIST, {recursive: true});
  const hold = await lock(path.join(DIST, 'build.lock'), 600_000);
  try {
    for (const [half, make] of [
      ['client', buildClient],
      ['server', buildServer],
    ]) {
      const now = fingerprint(SOURCES[half]);
      const stamp = path.join(DIST, `${half}.sources`);
      if (!force && fs.existsSync(stamp) && fs.readFileSync(stamp, 'utf8') === now) continue;
      say(`Building the ${half}`);
      fs.rmSync(stamp, {force: true}); // a build broken off is no build
      await make();
      fs.writeFileSync(stamp, now);
    }
  } finally {
    hold.release();
  }
}

/** Hash over paths and contents, without the specs; times do not count: a checkout changes them. */
export function fingerprint(places, root = ROOT) {
  const hash = createHash('sha256');
  for (const file of places.flatMap((place) => filesBelow(place, root)).sort()) {
    if (/\.spec\.ts$|(^|\/)test-support\//.test(file)) continue;
    hash
      .update(`${file}\0`)
      .update(fs.readFileSync(path.join(root, file)))
      .update('\0');
  }
  return hash.digest('hex');
}

async function buildClient() {
  const ng = path.join(ROOT, 'node_modules', '@angular', 'cli', 'bin', 'ng.js');
  await runChild(process.execPath, [ng, 'build', '--progress=false'], {
    cwd: ROOT,
    env: {...process.env, NG_CLI_ANALYTICS: 'false', NODE_ENV: 'production'},
  });
  checkBudget();
}

/**
 * main, worker and seed, and every `*-thread.ts`, which runs in a thread of the worker. All lie side by side, so that
 * `new URL('./x-thread.js', import.meta.url)` finds a thread from within the bundle.
 */
async function buildServer() {
  const {build: bundle} = await import('esbuild');
  const entries = filesBelow('server', ROOT)
    .filter((file) => /^server\/(main|worker|seed)\.ts$|-thread\.ts$/.test(file))
    .map((file) => ({in: file, out: path.basename(file, '.ts')}));
  fs.rmSync(path.join(DIST, 'server'), {recursive: true, force: true});
  await bundle({
    absWorkingDir: ROOT,
    entryPoints: entries,
    outdir: 'dist/server',
    bundle: true,
    platform: 'node',
    target: 'node20',
    format: 'esm',
    packages: 'external',
    minifySyntax: true, // puts numbers in the place of constants: the engine's loop is a fifth faster
    sourcemap: true,
    tsconfig: 'tsconfig.json',
    logLevel: 'silent', // the error thrown says it all
  });
}

function filesBelow(place, root) {
  const whole = path.join(root, place);
  if (!fs.existsSync(whole)) return [];
  if (!fs.statSync(whole).isDirectory()) return [place];
  return fs
    .readdirSync(whole, {withFileTypes: true, recursive: true})
    .filter((entry) => entry.isFile())
    .map((entry) => path.relative(root, path.join(entry.parentPath ?? entry.path, entry.name)));
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  const startedAt = Date.now();
  await build({force: process.argv.includes('--force')}).then(
    () => console.log(`dist/ is up to date (${((Date.now() - startedAt) / 1000).toFixed(1)} s)`),
    (error) => {
      console.error(error.message);
      process.exitCode = 1;
    },
  );
}
