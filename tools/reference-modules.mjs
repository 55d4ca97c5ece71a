// Writes sim-core/reference/*.rows.ts from the .json and .csv beside them, as specs that also run in a browser
// cannot read files:  node tools/reference-modules.mjs && npx prettier --write sim-core/reference
import fs from 'node:fs';
import path from 'node:path';

const folder = path.join(import.meta.dirname, '..', 'sim-core', 'reference');

for (const file of fs.readdirSync(folder).filter((name) => name.endsWith('.json'))) {
  const name = file.replace('.json', '');
  const document = JSON.stringify(JSON.parse(fs.readFileSync(path.join(folder, file), 'utf8')));
  const rows = fs.readFileSync(path.join(folder, `${name}.csv`), 'utf8').trim();
  const text = `// Made by tools/reference-modules.mjs from ${name}.json and ${name}.csv.
export const DOCUMENT = JSON.parse(\`${document}\`) as unknown;

/** True answer each 0.1 s: SciPy 1.10.1, solve_ivp with DOP853, rtol 1e-10; see README.md beside. */
export const ROWS = \`${rows}\`;
`;
  fs.writeFileSync(path.join(folder, `${name}.rows.ts`), text);
}
