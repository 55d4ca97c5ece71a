// Where a private cluster lies, which PostgreSQL serves it and as whom. Plain Node, no packages.
import {spawnSync} from 'node:child_process';
import {createHash} from 'node:crypto';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import {fileURLToPath} from 'node:url';

/** Superuser and database of every private cluster. */
export const NAME = 'evenspan';
const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..', '..');
const DEBIAN = '/usr/lib/postgresql';

/** Thrown when the server programs are missing; whoever may install them catches it. */
export class PostgresMissingError extends Error {}

/** Folder with initdb and postgres: PG_BIN, Debian's layout (newest first, or `version` alone), PATH. */
export function findPrograms(version) {
  const versions = fs.existsSync(DEBIAN) ? fs.readdirSync(DEBIAN) : [];
  const newestFirst = versions.sort((a, b) => Number(b) - Number(a));
  const candidates = [
    ...(process.env.PG_BIN ? [process.env.PG_BIN] : []),
    ...newestFirst.map((each) => path.join(DEBIAN, each, 'bin')),
    ...(process.env.PATH ?? '').split(path.delimiter),
  ].filter(hasServer);
  const found = candidates.find((folder) => !version || versionOf(folder) === version);
  if (found) return found;
  throw new PostgresMissingError(
    version && candidates.length > 0
      ? `The database was made by PostgreSQL ${version}, which is no longer installed: apt-get install -y postgresql-${version}`
      : 'PostgreSQL is not installed: apt-get install -y postgresql (or set PG_BIN to its program folder).',
  );
}

/** The system user that runs the server: PostgreSQL refuses to run as root. Empty for "the one who asks". */
export function pickUser(folder) {
  if (process.getuid() !== 0) return {};
  const data = path.join(folder, 'data');
  if (fs.existsSync(data)) {
    const {uid, gid} = fs.statSync(data); // an ordinary user's cluster stays that user's
    if (uid !== 0) return {uid, gid};
  }
  const line = fs
    .readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .find((each) => each.startsWith('postgres:'));
  if (!line)
    throw new PostgresMissingError('There is no user "postgres": apt-get install -y postgresql');
  const [, , uid, gid] = line.split(':');
  return {uid: Number(uid), gid: Number(gid)};
}

/** `.pg/<sub>` in the checkout; a fixed place outside it when the server's user may not enter the checkout. */
export function placeFor(sub) {
  if (process.env.PG_DIR) return path.join(path.resolve(process.env.PG_DIR), sub);
  const local = path.join(ROOT, '.pg', sub);
  const user = pickUser(local);
  if (user.uid === undefined || mayEnter(ROOT, user)) return local;
  const checkout = createHash('sha256').update(ROOT).digest('hex').slice(0, 12);
  const base = mayEnter('/var/lib/postgresql', user) ? '/var/lib/postgresql' : os.tmpdir();
  return path.join(base, `${NAME}-${checkout}`, sub);
}

/** Makes the folder for `user`, or says in one line why it cannot be used. */
export function makeFolder(folder, user) {
  try {
    fs.mkdirSync(path.dirname(folder), {recursive: true, mode: 0o755});
    fs.mkdirSync(folder, {recursive: true, mode: 0o700});
    if (user.uid !== undefined) fs.chownSync(folder, user.uid, user.gid);
    fs.accessSync(folder, fs.constants.R_OK | fs.constants.W_OK | fs.constants.X_OK);
  } catch (error) {
    if (error.code !== 'EACCES' && error.code !== 'EPERM') throw error;
    throw new Error(
      `The database folder ${folder} belongs to another user (perhaps root started it first): ` +
        'start as that user, or set PG_DIR to a folder of your own.',
    );
  }
}

function hasServer(folder) {
  return ['initdb', 'postgres'].every((each) => fs.existsSync(path.join(folder, each)));
}

function versionOf(folder) {
  const said = spawnSync(path.join(folder, 'postgres'), ['--version'], {encoding: 'utf8'}).stdout;
  return /(\d+)/.exec(said ?? '')?.[1];
}

function mayEnter(folder, user) {
  return spawnSync('/usr/bin/test', ['-x', folder], {...user, cwd: '/'}).status === 0;
}
