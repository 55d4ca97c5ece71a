import {type AddressInfo, connect, createServer, type Socket} from 'node:net';

/** A way to a database that can be cut and mended, as a network or a restarting server does. */
export interface DatabaseProxy {
  readonly url: string;
  /** Drops every connection and takes no more. */
  readonly cut: () => Promise<void>;
  readonly mend: () => Promise<void>;
}

export async function startDatabaseProxy(databaseUrl: string): Promise<DatabaseProxy> {
  const target = new URL(databaseUrl);
  const sockets = new Set<Socket>();
  const proxy = createServer((near) => {
    const far = connect(Number(target.port), target.hostname);
    for (const [socket, other] of [
      [near, far],
      [far, near],
    ] as const) {
      sockets.add(socket);
      socket.on('error', () => other.destroy());
      socket.on('close', () => {
        sockets.delete(socket);
        other.destroy();
      });
      socket.pipe(other);
    }
  });
  const listen = (port: number): Promise<void> =>
    new Promise((resolve) => proxy.listen(port, '127.0.0.1', resolve));
  await listen(0);
  const {port} = proxy.address() as AddressInfo;
  const url = new URL(databaseUrl);
  url.port = String(port);
  const cut = async (): Promise<void> => {
    const closed = new Promise<void>((resolve) => proxy.close(() => resolve()));
    for (const socket of sockets) socket.destroy();
    await closed;
  };
  return {url: url.href, cut, mend: () => listen(port)};
}
