// Runs Node specs: node --import tsx tools/testing/jasmine.mjs RESULT.json GLOB…
// The result gets {passed, failed}; a skipped or focused spec, or an error while loading, counts as failed.
import fs from 'node:fs';
import process from 'node:process';
import Jasmine from 'jasmine';
import {ROOT} from '../modules.mjs';

/** A spec may wait for a server to start on a machine that does other things too. */
const PATIENCE_MS = 60_000;
const [result, ...globs] = process.argv.slice(2);
const counts = {passed: 0, failed: 0};
const runner = new Jasmine({projectBaseDir: ROOT});
runner.loadConfig({
  spec_dir: '.',
  spec_files: [...globs, '!**/node_modules/**'],
  env: {random: true, forbidDuplicateNames: false},
});
runner.exitOnCompletion = false;
runner.jasmine.DEFAULT_TIMEOUT_INTERVAL = PATIENCE_MS;
runner.addReporter({
  specDone({status}) {
    if (status === 'passed') counts.passed++;
    else if (status !== 'excluded') counts.failed++;
  },
});
const done = await runner.execute();
if (done.overallStatus !== 'passed' && counts.failed === 0 && counts.passed > 0) counts.failed = 1;
fs.writeFileSync(result, JSON.stringify(counts));
process.exit(done.overallStatus === 'passed' ? 0 : 1); // a handle left open must not hold the run
