// npm run test:planted [-- WORD]: plants one error after the other in a copy of the engine and runs its specs there.
// Each must turn one red. Ends with 1 when one stays unnoticed, or when an edit finds nothing to change.
import {spawnSync} from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import {ROOT} from '../modules.mjs';
import {ERRORS} from './errors.mjs';

/** Without the pinned bytes, which any change at all turns red. */
const SPECS = 'sim-core/**/!(hashes).spec.ts';

const [word = ''] = process.argv.slice(2);
const chosen = ERRORS.filter(({name}) => name.includes(word));
const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'evenspan-errors-'));
try {
  for (const each of ['package.json', 'tsconfig.json', 'tsconfig.base.json'])
    fs.copyFileSync(path.join(ROOT, each), path.join(folder, each));
  fs.symlinkSync(path.join(ROOT, 'node_modules'), path.join(folder, 'node_modules'));
  // what is tried is what lies there now, whatever happens to it meanwhile
  fs.cpSync(path.join(ROOT, 'sim-core'), path.join(folder, 'clean'), {recursive: true});
  const clean = plant([]);
  if (clean.failed.length > 0) throw new Error(`Red without an error:\n${clean.failed.join('\n')}`);

  const missed = [];
  console.log('| error | specs red | one of them |\n| --- | --- | --- |');
  for (const {name, edits} of chosen) {
    const {failed} = plant(edits);
    if (failed.length === 0) missed.push(name);
    console.log(`| ${name} | ${failed.length} | ${witness(failed)} |`);
  }
  console.log(`\n${chosen.length - missed.length} noticed, ${missed.length} missed`);
  if (missed.length > 0) process.exitCode = 1;
} finally {
  fs.rmSync(folder, {recursive: true, force: true});
}

/** Copies the engine, makes the edits, runs the specs; answers the names of those that failed. */
function plant(edits) {
  const engine = path.join(folder, 'sim-core');
  fs.rmSync(engine, {recursive: true, force: true});
  fs.cpSync(path.join(folder, 'clean'), engine, {recursive: true});
  for (const [file, from, to] of edits) {
    const place = path.join(folder, file);
    const text = fs.readFileSync(place, 'utf8');
    if (!text.includes(from)) throw new Error(`${file} has no “${from}”`);
    fs.writeFileSync(place, text.replaceAll(from, to));
  }
  const jasmine = path.join('node_modules', 'jasmine', 'bin', 'jasmine.js');
  const words = ['--import', 'tsx', jasmine, '--random=false', SPECS];
  const {stdout, stderr, status} = spawnSync(process.execPath, words, {
    cwd: folder,
    encoding: 'utf8',
    maxBuffer: 256 * 1024 * 1024,
  });
  const failed = [...stdout.matchAll(/^\d+\) (.*)$/gm)].map(([, name]) => name);
  if (!/\d+ specs, \d+ failure/.test(stdout)) throw new Error(`No specs ran: ${stderr}`);
  if (status !== 0 && failed.length === 0) throw new Error(stdout);
  return {failed};
}

/** The failed spec that says most: one with a source outside the project before any other. */
function witness(failed) {
  const outside = failed.find((name) => /^(handbook|reference)/i.test(name));
  return outside ?? failed[0] ?? '–';
}
