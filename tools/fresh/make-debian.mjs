// A small Debian in a folder: the release, the mirrors and the certificates of this machine, Node.js and a clone.
import {spawnSync} from 'node:child_process';
import fs from 'node:fs';
import path from 'node:path';
import {runChild} from '../children.mjs';
import {ROOT} from '../modules.mjs';

/** Where the clone lies inside. */
export const CLONE = '/srv/evenspan';
const CERTIFICATES = '/etc/ssl/certs/ca-certificates.crt';

export async function makeDebian(folder) {
  const sources = debianSources();
  const [base] = sources;
  console.log(`Making a Debian ${base.codename} in ${folder}`);
  await runChild('debootstrap', ['--variant=minbase', base.codename, folder, base.address]);
  writeSources(folder, sources);
  for (const file of ['/etc/resolv.conf', '/etc/hosts', CERTIFICATES]) copyInto(folder, file);
  copyNode(folder);
  await runChild('git', ['clone', '--quiet', '--no-hardlinks', ROOT, path.join(folder, CLONE)]);
}

/** This machine's Debian archives, the release itself first. */
function debianSources() {
  const format = '$(ORIGIN) $(REPO_URI) $(CODENAME) $(COMPONENT)';
  const said = spawnSync('apt-get', ['indextargets', '--format', format, 'Created-By: Packages'], {
    encoding: 'utf8',
  });
  const release = /^VERSION_CODENAME=(\w+)/m.exec(fs.readFileSync('/etc/os-release', 'utf8'))?.[1];
  const sources = said.stdout
    .split('\n')
    .map((line) => line.split(' '))
    .filter(([origin]) => origin === 'Debian')
    .map(([, address, codename, component]) => ({address, codename, component}))
    .sort((a, b) => Number(b.codename === release) - Number(a.codename === release));
  if (sources[0]?.codename === release) return sources;
  throw new Error(`apt knows no archive of Debian ${release} here; run apt-get update first.`);
}

function writeSources(folder, sources) {
  const lines = sources.map(
    ({address, codename, component}) => `deb ${address} ${codename} ${component}\n`,
  );
  fs.writeFileSync(path.join(folder, 'etc/apt/sources.list'), lines.join(''));
  const settings = spawnSync('apt-config', ['dump'], {encoding: 'utf8'}).stdout;
  const way = settings.split('\n').filter((line) => /^Acquire::https?::/i.test(line));
  fs.writeFileSync(path.join(folder, 'etc/apt/apt.conf.d/90fresh'), `${way.join('\n')}\n`);
}

/** The node that runs this, with its npm. */
function copyNode(folder) {
  const npm = path.resolve(path.dirname(process.execPath), '../lib/node_modules/npm');
  const local = path.join(folder, 'usr/local');
  fs.mkdirSync(path.join(local, 'bin'), {recursive: true});
  fs.copyFileSync(process.execPath, path.join(local, 'bin/node'));
  fs.cpSync(npm, path.join(local, 'lib/node_modules/npm'), {recursive: true});
  fs.symlinkSync('../lib/node_modules/npm/bin/npm-cli.js', path.join(local, 'bin/npm'));
}

function copyInto(folder, file) {
  if (!fs.existsSync(file)) return;
  fs.mkdirSync(path.join(folder, path.dirname(file)), {recursive: true});
  fs.rmSync(path.join(folder, file), {force: true});
  fs.copyFileSync(file, path.join(folder, file));
}

/** How npm reaches its registry from here, as variables: nothing of it is written down. */
export function npmEnvironment() {
  const ask = (key) =>
    spawnSync('npm', ['config', 'get', key], {cwd: '/', encoding: 'utf8'}).stdout.trim();
  return {
    npm_config_registry: ask('registry'),
    ...(fs.existsSync(CERTIFICATES)
      ? {npm_config_cafile: CERTIFICATES, NODE_EXTRA_CA_CERTS: CERTIFICATES}
      : {}),
  };
}
