import {createHash} from 'node:crypto';
import {existsSync, readFileSync} from 'node:fs';
import path from 'node:path';

/** Names what was built: the same on every instance of one build, another after the next. */
export function nameBuild(clientFolder: string): string {
  // The client's file names carry hashes of their contents, and index.html names them.
  const index = path.join(clientFolder, 'index.html');
  if (!existsSync(index)) return 'unbuilt';
  return createHash('sha256').update(readFileSync(index)).digest('hex').slice(0, 12);
}
