import {readConfig} from './config';
import {makeLog} from './log';
import {runProgram} from './process';
import {startServer} from './server';

await runProgram(async () => {
  const config = readConfig();
  const log = makeLog(config.logLevel);
  const server = await startServer(config, log);
  log.info({url: server.url, build: config.build}, 'listening');
  return {
    stop: async () => {
      log.info('stopping');
      await server.stop();
    },
  };
});
