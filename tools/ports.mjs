// Ports on loopback. Plain Node: runs before node_modules exist.
import net from 'node:net';

/** Whether nobody listens on `port`; port 0 is never free. */
export function portIsFree(port) {
  return listen(port).then(
    () => port > 0,
    () => false,
  );
}

/** A port that was free a moment ago. */
export function freePort() {
  return listen(0);
}

function listen(port) {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.once('error', reject);
    server.listen(port, '127.0.0.1', () => {
      const {port: given} = server.address();
      server.close(() => resolve(given));
    });
  });
}
