// .run/: what belongs to this checkout's running program: lock, secret, logs.
import {randomBytes} from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import {ROOT} from '../modules.mjs';

export function makeRunFolder() {
  const folder = path.join(ROOT, '.run');
  fs.mkdirSync(folder, {recursive: true, mode: 0o700});
  fs.accessSync(folder, fs.constants.W_OK);
  return folder;
}

/** Signs the session cookies; kept, so that people stay signed in over a restart. */
export function sessionSecret(folder) {
  const file = path.join(folder, 'session-secret');
  if (!fs.existsSync(file) || fs.readFileSync(file, 'utf8').length < 64) {
    fs.writeFileSync(file, randomBytes(32).toString('hex'), {mode: 0o600});
  }
  return fs.readFileSync(file, 'utf8');
}
