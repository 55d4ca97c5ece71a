import {readConfig} from './config';
import {makeDataSource} from './db/data-source';
import {migrate} from './db/migrate';
import {JOBS} from './jobs';
import {startWorker} from './jobs/worker';
import {makeLog} from './log';
import {runProgram} from './process';

await runProgram(async () => {
  const config = readConfig();
  const log = makeLog(config.logLevel);
  await migrate(config, log);
  const db = await makeDataSource(config.databaseUrl).initialize();
  const worker = await startWorker(JOBS, {config, db, log, now: () => new Date()});
  log.info({jobs: JOBS.map(({name}) => name)}, 'working');
  return {
    stop: async () => {
      log.info('stopping');
      await worker.stop();
      await db.destroy();
    },
  };
});
