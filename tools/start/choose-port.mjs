// Which port the server gets.
import {portIsFree} from '../ports.mjs';

const DEFAULT_PORT = 4000;
/** How many ports after the default one are tried. */
const TRIES = 50;

/** The port asked for, which must be free; else the default or the next free one after it, which is said. */
export async function choosePort(asked, say = console.log) {
  if (asked !== undefined && asked !== '') {
    const port = Number(asked);
    if (!Number.isInteger(port) || port < 1 || port > 65_535) {
      throw new Error(`PORT must be a whole number from 1 to 65535, not "${asked}".`);
    }
    if (await portIsFree(port)) return port;
    throw new Error(`Port ${port} is taken or not allowed; give another one in PORT.`);
  }
  for (let port = DEFAULT_PORT; port < DEFAULT_PORT + TRIES; port++) {
    if (!(await portIsFree(port))) continue;
    if (port !== DEFAULT_PORT) say(`Port ${DEFAULT_PORT} is taken; using ${port}.`);
    return port;
  }
  throw new Error(
    `Ports ${DEFAULT_PORT} to ${DEFAULT_PORT + TRIES - 1} are all taken; give another one in PORT.`,
  );
}
