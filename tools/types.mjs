// Checks the types of every TypeScript project, two at a time.
//   node tools/types.mjs [RESULT.json]     the file gets {passed, failed}
import fs from 'node:fs';
import path from 'node:path';
import {watchChild} from './children.mjs';
import {ROOT} from './modules.mjs';

/** Those with templates go through Angular's own compiler. */
const WITH_TEMPLATES = ['tsconfig.app.json', 'tsconfig.spec.json'];
const AT_ONCE = 2;

function projects() {
  return ['.', 'sim-core', 'shared'].flatMap((folder) =>
    fs
      .readdirSync(path.join(ROOT, folder))
      .filter((file) => /^tsconfig.*\.json$/.test(file) && file !== 'tsconfig.base.json')
      .map((file) => path.join(folder, file)),
  );
}

async function check(project) {
  const compiler = WITH_TEMPLATES.includes(project)
    ? path.join('@angular', 'compiler-cli', 'bundles', 'src', 'bin', 'ngc.js')
    : path.join('typescript', 'bin', 'tsc');
  const {code, output} = await watchChild(
    process.execPath,
    [path.join(ROOT, 'node_modules', compiler), '-p', project, '--noEmit', '--rootDir', ROOT],
    {cwd: ROOT},
  );
  console.log(code === 0 ? `ok      ${project}` : `failed  ${project}\n${output.trimEnd()}`);
  return code === 0;
}

const waiting = projects();
const results = [];
async function work() {
  for (let next = waiting.shift(); next; next = waiting.shift()) results.push(await check(next));
}
await Promise.all(Array.from({length: AT_ONCE}, work));

const passed = results.filter(Boolean).length;
const counts = {passed, failed: results.length - passed};
if (process.argv[2]) fs.writeFileSync(process.argv[2], JSON.stringify(counts));
process.exitCode = counts.failed > 0 ? 1 : 0;
