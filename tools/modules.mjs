// The right Node and the packages of package-lock.json. Plain Node: runs before node_modules exist.
import fs from 'node:fs';
import path from 'node:path';
import {fileURLToPath} from 'node:url';
import {runChild} from './children.mjs';

export const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..');

/** Throws in one line when this Node is not the one package.json asks for. */
export function checkNode(version = process.versions.node) {
  const {engines} = readJson('package.json');
  const [, least, below] = /^>=(\S+) <(\d+)$/.exec(engines.node);
  const numbers = (text) => text.split('.').map(Number);
  const [major, minor] = numbers(version);
  const [leastMajor, leastMinor] = numbers(least);
  const isOldEnough = major < Number(below);
  const isNewEnough = major > leastMajor || (major === leastMajor && minor >= leastMinor);
  if (isOldEnough && isNewEnough) return;
  throw new Error(
    `Evenspan needs Node.js ${engines.node}; this is ${version} (${process.execPath}).`,
  );
}

/** Whether node_modules hold what package-lock.json names; npm writes its own list there as the last thing it does. */
export function modulesAreInstalled(root = ROOT) {
  const installed = path.join(root, 'node_modules', '.package-lock.json');
  if (!fs.existsSync(installed)) return false;
  const wanted = JSON.parse(fs.readFileSync(path.join(root, 'package-lock.json'), 'utf8')).packages;
  const present = JSON.parse(fs.readFileSync(installed, 'utf8')).packages;
  return Object.entries(wanted).every(([place, {version, optional}]) => {
    if (place === '') return true; // the project itself
    if (present[place]) return present[place].version === version;
    return optional === true; // for another platform
  });
}

/** Runs `npm ci` when package-lock.json says so. */
export async function installModules() {
  if (modulesAreInstalled()) return;
  console.log('Installing the packages of package-lock.json: npm ci (about a minute)');
  await runChild('npm', ['ci', '--include=dev', '--no-audit', '--no-fund', '--loglevel=error'], {
    cwd: ROOT,
  });
  if (!modulesAreInstalled())
    throw new Error('npm ci ended without installing what package-lock.json names.');
}

function readJson(file) {
  return JSON.parse(fs.readFileSync(path.join(ROOT, file), 'utf8'));
}
