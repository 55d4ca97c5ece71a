import {createServer, type Server} from 'node:http';
import {type AddressInfo} from 'node:net';
import {type Logger} from 'pino';
import {type AppParts} from './app-parts';
import {makeApp} from './app';
import {type Config} from './config';
import {makeDataSource} from './db/data-source';
import {migrate} from './db/migrate';
import {EventHub} from './events/event-hub';
import {Listener} from './events/listener';
import {closeServer} from './http/close-server';
import {makeJobSender} from './jobs/boss';

/** A server that listens. */
export interface RunningServer {
  readonly url: string;
  /** Takes no more calls, ends the event streams, lets the calls in flight end, closes the database. */
  readonly stop: () => Promise<void>;
}

/** Migrates, opens what the server needs, and listens. */
export async function startServer(config: Config, log: Logger): Promise<RunningServer> {
  if (config.hasOneDatabaseUser) {
    log.warn('one database user for everything: the server could change its own tables');
  }
  await migrate(config, log);
  const db = await makeDataSource(config.databaseUrl).initialize();
  const events = new EventHub();
  const listener = new Listener(config.databaseUrl, events, log);
  await listener.start();
  const parts: AppParts = {config, db, jobs: makeJobSender(), events, log, now: () => new Date()};
  const http = createServer(makeApp(parts).express);
  await listen(http, config);
  const {port} = http.address() as AddressInfo;
  return {
    url: `http://${config.host}:${port}`,
    stop: async () => {
      await closeServer(http, events);
      await listener.stop();
      await db.destroy();
    },
  };
}

function listen(http: Server, {host, port}: Config): Promise<void> {
  return new Promise((resolve, reject) => {
    http.once('error', reject);
    http.listen(port, host, resolve);
  });
}
