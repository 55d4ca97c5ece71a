// npm run test:fresh (root): both commands on a Debian with Node.js and nothing else, made by debootstrap in a
// folder of its own. Ends with "N passed, N failed". What is tested is the last commit, not the working tree.
import {spawnSync} from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import {endChildren, watchChild} from './children.mjs';
import {installPackages, isRoot} from './debian.mjs';
import {makeDebian} from './fresh/make-debian.mjs';
import {ROOT} from './modules.mjs';

/** Mounts and processes live in namespaces of their own: they are gone when the run is, however it ends. */
const NAMESPACES = ['--mount', '--pid', '--fork', '--kill-child'];

async function main() {
  if (!isRoot()) throw new Error('test:fresh makes a Debian of its own, which only root may do.');
  if (!fs.existsSync('/usr/sbin/debootstrap')) installPackages('debootstrap', ['debootstrap']);
  const dirty = spawnSync('git', ['status', '--porcelain'], {cwd: ROOT, encoding: 'utf8'}).stdout;
  if (dirty) console.log('Changes that are not committed are not tested.');

  const folder = fs.mkdtempSync(path.join(os.tmpdir(), 'evenspan-fresh-'));
  fs.chmodSync(folder, 0o755); // ordinary users live in it too
  try {
    await makeDebian(folder);
    const inside = path.join(ROOT, 'tools', 'fresh', 'inside.mjs');
    const {code} = await watchChild('unshare', [...NAMESPACES, process.execPath, inside, folder], {
      show: true,
    });
    return code ?? 1; // null when it was killed
  } finally {
    fs.rmSync(folder, {recursive: true, force: true});
  }
}

// unshare lets no gentler signal through.
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'])
  process.on(signal, () => endChildren('SIGKILL'));
process.exitCode = await main().catch((error) => {
  console.error(error.message);
  console.log('0 passed, 1 failed');
  return 1;
});
