import {readConfig} from '../config';
import {makeDataSource} from '../db/data-source';
import {startWorker} from '../jobs/worker';
import {makeLog} from '../log';
import {runner, slowJob} from './slow-job';
import {testSettings} from './test-settings';

const UPKEEP_S = 1;

runner.name = process.argv[2] ?? '';
runner.takesMs = runner.name === 'first' ? 60_000 : 10;
const config = readConfig(testSettings(process.env['SPEC_DATABASE_URL'] ?? ''));
const db = await makeDataSource(config.databaseUrl).initialize();
const parts = {config, db, log: makeLog('error'), now: () => new Date()};
await startWorker([slowJob], parts, UPKEEP_S);
process.stdout.write('ready\n');
