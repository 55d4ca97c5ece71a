// The first page may cost at most 250 kB on the wire: everything dist/client/index.html names, compressed.
//   node tools/budget.mjs
import fs from 'node:fs';
import path from 'node:path';
import {fileURLToPath} from 'node:url';
import {gzipSync} from 'node:zlib';
import {ROOT} from './modules.mjs';

const LIMIT_KB = 250;

/** Scripts and styles that a page's HTML fetches before anything else. */
export function initialFiles(html) {
  const named = [...html.matchAll(/(?:src|href)="([^"]+\.(?:js|css))"/g)].map(([, file]) => file);
  return [...new Set(named)];
}

/** Size of the first page [kB], compressed as a server would; throws when it is over the limit. */
export function checkBudget(folder = path.join(ROOT, 'dist', 'client')) {
  const html = fs.readFileSync(path.join(folder, 'index.html'), 'utf8');
  const files = initialFiles(html);
  if (files.length === 0)
    throw new Error('index.html names no script: the budget measures nothing');
  const bytes = withImports(folder, files).map((file) => gzipSync(readFile(folder, file)).length);
  const kb = bytes.reduce((sum, size) => sum + size, gzipSync(html).length) / 1000;
  if (kb > LIMIT_KB) {
    throw new Error(
      `The first page takes ${kb.toFixed(0)} kB on the wire, allowed are ${LIMIT_KB}.`,
    );
  }
  return kb;
}

/** Static imports are fetched too, whether the page names them or not. */
function withImports(folder, files) {
  const found = new Set(files);
  for (const file of found) {
    if (!file.endsWith('.js')) continue;
    const imports = readFile(folder, file).matchAll(/(?:from|import)\s*"\.\/([^"]+\.js)"/g);
    for (const [, imported] of imports) found.add(imported); // a Set goes on to what is added
  }
  return [...found];
}

function readFile(folder, file) {
  return fs.readFileSync(path.join(folder, file), 'utf8');
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  console.log(`The first page takes ${checkBudget().toFixed(1)} kB of ${LIMIT_KB} kB.`);
}
