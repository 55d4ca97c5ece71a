// npm test [PART…]: lint, types, unit, web, e2e. Ends with the line "N passed, N failed" over all parts.
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import {endChildren} from './children.mjs';
import {checkNode, installModules} from './modules.mjs';
import {parts} from './testing/parts.mjs';
import {addUp, describeCounts} from './testing/counts.mjs';

const GROUPS = [...new Set(parts.map(({group}) => group))];

async function main(asked) {
  const unknown = asked.filter((name) => !GROUPS.includes(name));
  if (unknown.length > 0) {
    throw new Error(`No such part: ${unknown.join(', ')}. The parts are ${GROUPS.join(', ')}.`);
  }
  checkNode();
  await installModules();
  const chosen = parts.filter(({group}) => asked.length === 0 || asked.includes(group));
  const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'evenspan-test-'));
  try {
    const counts = [];
    // What measures or waits for frames runs alone; the others share the two cores that a small machine has.
    await inTurns(
      chosen.filter(({alone}) => !alone),
      2,
      folder,
      counts,
    );
    await inTurns(
      chosen.filter(({alone}) => alone),
      1,
      folder,
      counts,
    );
    return addUp(counts);
  } finally {
    fs.rmSync(folder, {recursive: true, force: true});
  }
}

async function inTurns(chosen, atOnce, folder, counts) {
  const waiting = [...chosen];
  const work = async () => {
    for (let part = waiting.shift(); part; part = waiting.shift())
      counts.push(await runPart(part, folder));
  };
  await Promise.all(Array.from({length: atOnce}, work));
}

/** Runs one part; its output comes in one piece at its end, so that two at once stay readable. */
async function runPart(part, folder) {
  const startedAt = Date.now();
  const result = path.join(folder, `${part.name}.json`);
  console.log(`… ${part.name}`);
  let counts;
  let output = '';
  try {
    ({counts, output} = await part.run(result));
  } catch (error) {
    output = `${error.message}\n`;
    counts = {passed: 0, failed: 1};
  }
  if (counts.passed + counts.failed === 0) {
    output += 'This part ran nothing, which counts as failed.\n';
    counts = {passed: 0, failed: 1};
  }
  const seconds = ((Date.now() - startedAt) / 1000).toFixed(1);
  if (counts.failed > 0 && output.trim() !== '')
    console.log(`\n──── ${part.name}\n${output.trimEnd()}\n────`);
  console.log(
    `${counts.failed === 0 ? '✓' : '✗'} ${part.name}: ${describeCounts(counts)} (${seconds} s)`,
  );
  return counts;
}

for (const [signal, code] of [
  ['SIGINT', 130],
  ['SIGTERM', 143],
  ['SIGHUP', 129],
]) {
  process.on(signal, () => {
    endChildren();
    setTimeout(() => process.exit(code), 2_000);
  });
}
let total;
try {
  total = await main(process.argv.slice(2));
} catch (error) {
  console.error(error.message);
  total = {passed: 0, failed: 1};
}
console.log(describeCounts(total));
process.exit(total.failed > 0 ? 1 : 0);
