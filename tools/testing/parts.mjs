// The parts of npm test: how each is run and how its tests are counted.
import fs from 'node:fs';
import path from 'node:path';
import {build} from '../build.mjs';
import {watchChild} from '../children.mjs';
import {installPackages, installPostgres} from '../debian.mjs';
import {ROOT} from '../modules.mjs';
import {findPrograms, PostgresMissingError} from '../postgres/place.mjs';
import {addUp, countKarma, countPlaywright, withExitCode} from './counts.mjs';

const bin = (...names) => path.join(ROOT, 'node_modules', ...names);

/** `alone`: nothing else runs meanwhile. */
export const parts = [
  {name: 'server', group: 'unit', run: runServerSpecs},
  {name: 'lint', group: 'lint', run: runLint},
  {name: 'types', group: 'types', run: runTypes},
  {name: 'engine', group: 'unit', run: runEngineSpecs},
  {name: 'repeat', group: 'unit', run: runRepeatSpecs},
  {name: 'web', group: 'web', run: runWeb, alone: true},
  {name: 'e2e', group: 'e2e', run: runEndToEnd, alone: true},
];

async function runLint() {
  const said = [
    await node([bin('eslint', 'bin', 'eslint.js'), '.', '--max-warnings', '0']),
    await node([bin('prettier', 'bin', 'prettier.cjs'), '--check', '.', '--log-level', 'warn']),
  ];
  return {
    counts: addUp(
      said.map(({code}) => (code === 0 ? {passed: 1, failed: 0} : {passed: 0, failed: 1})),
    ),
    output: said.map(({output}) => output).join(''),
  };
}

async function runTypes(result) {
  return counted(await node(['tools/types.mjs', result]), result);
}

/** Everything that needs no database. */
function runEngineSpecs(result) {
  return runJasmine(result, [
    '{sim-core,shared}/**/*.spec.ts',
    'tools/**/!(pg).spec.mjs',
    'test/architecture/**/*.spec.ts',
  ]);
}

function runServerSpecs(result) {
  needPostgres();
  return runJasmine(result, [
    'server/**/*.spec.ts',
    'test/{contract,support}/**/*.spec.ts',
    'tools/pg.spec.mjs',
  ]);
}

/** Same document and log, same bits: in Node and two browsers, through the wire and the database. */
function runRepeatSpecs(result) {
  needPostgres();
  needChromium();
  needFirefox();
  return runJasmine(result, ['test/repeat/**/*.spec.ts']);
}

async function runJasmine(result, globs) {
  const words = ['--import', 'tsx', 'tools/testing/jasmine.mjs', result, ...globs];
  return counted(await node(words), result);
}

async function runWeb() {
  needChromium();
  const said = await node([bin('@angular', 'cli', 'bin', 'ng.js'), 'test'], {
    NG_CLI_ANALYTICS: 'false',
  });
  return {counts: withExitCode(countKarma(said.output), said.code), output: said.output};
}

async function runEndToEnd(result) {
  needPostgres();
  needChromium();
  await build({say: () => {}});
  const said = await node(
    [
      bin('@playwright', 'test', 'cli.js'),
      'test',
      '-c',
      'test/e2e/playwright.config.ts',
      '--reporter=list,json',
    ],
    {PLAYWRIGHT_JSON_OUTPUT_FILE: result},
  );
  const counts = fs.existsSync(result) ? countPlaywright(readJson(result)) : {passed: 0, failed: 0};
  return {counts: withExitCode(counts, said.code), output: said.output};
}

function needChromium() {
  if (!fs.existsSync('/usr/bin/chromium')) installPackages('Chromium', ['chromium']);
}

function needFirefox() {
  if (!fs.existsSync('/usr/bin/firefox-esr')) installPackages('Firefox', ['firefox-esr']);
}

function needPostgres() {
  try {
    findPrograms();
  } catch (error) {
    if (!(error instanceof PostgresMissingError)) throw error;
    installPostgres();
  }
}

function counted({code, output}, result) {
  const counts = fs.existsSync(result) ? readJson(result) : {passed: 0, failed: 0};
  return {counts: withExitCode(counts, code), output};
}

function node(words, env = {}) {
  return watchChild(process.execPath, words, {cwd: ROOT, env: {...process.env, ...env}});
}

function readJson(file) {
  return JSON.parse(fs.readFileSync(file, 'utf8'));
}
