// Programs from Debian's packages: installed as root, named with the exact command otherwise. Plain Node.
import {spawnSync} from 'node:child_process';
import fs from 'node:fs';

/** Debian's list of what may be made when a PostgreSQL package is installed; ours lies there for that moment only. */
const CREATE_CLUSTER = '/etc/postgresql-common/createcluster.d';

/** Thrown when something is missing and whoever asks may not install it. Nothing has been changed then. */
export class MissingProgramError extends Error {}

export function isRoot() {
  return process.getuid?.() === 0;
}

/** Throws unless `packages` can be installed here; `what` names the thing in the message. */
export function checkMayInstall(what, packages) {
  const command = `apt-get update && apt-get install -y --no-install-recommends ${packages.join(' ')}`;
  if (!hasProgram('apt-get')) {
    throw new MissingProgramError(
      `${what} is missing, and there is no apt-get here to install it with.`,
    );
  }
  if (isRoot()) return;
  throw new MissingProgramError(
    `${what} is missing, and only root may install it. Run this once, then try again:\n\n  sudo sh -c '${command}'\n`,
  );
}

/** Installs Debian packages, saying so first. */
export function installPackages(what, packages) {
  checkMayInstall(what, packages);
  console.log(`Installing ${what} from Debian's packages: apt-get install ${packages.join(' ')}`);
  const install = ['install', '-y', '-q', '--no-install-recommends', ...packages];
  if (aptGet(['update', '-q']).status !== 0) {
    console.log('The package lists could not be renewed; trying with those at hand.');
  }
  const done = aptGet(install);
  if (done.status !== 0) {
    const said = `${done.stdout ?? ''}${done.stderr ?? done.error?.message ?? ''}`.trim();
    throw new MissingProgramError(
      `apt-get ${install.join(' ')} failed:\n${said.split('\n').slice(-12).join('\n')}`,
    );
  }
}

/** PostgreSQL's programs without the cluster "main" that its package would make and start. */
export function installPostgres() {
  checkMayInstall('PostgreSQL', ['postgresql']);
  const file = `${CREATE_CLUSTER}/evenspan.conf`;
  const had = fs.existsSync('/usr/lib/postgresql');
  if (!had) {
    fs.mkdirSync(CREATE_CLUSTER, {recursive: true});
    fs.writeFileSync(file, 'create_main_cluster = false\n');
  }
  try {
    installPackages('PostgreSQL', ['postgresql']);
  } finally {
    if (!had) fs.rmSync(file, {force: true});
  }
}

function aptGet(words) {
  return spawnSync('apt-get', words, {
    encoding: 'utf8',
    env: {...process.env, DEBIAN_FRONTEND: 'noninteractive'},
    maxBuffer: 64 * 1024 * 1024,
  });
}

function hasProgram(name) {
  return (process.env.PATH ?? '').split(':').some((folder) => fs.existsSync(`${folder}/${name}`));
}
