import * as z from 'zod';
import {job} from '../jobs/job';

/** Who runs it; the worker process says so before it starts. */
export const runner = {name: '', takesMs: 0};

/** A job that takes its time and tells on standard output when it begins and ends. */
export const slowJob = job({
  name: 'spec-slow',
  data: z.object({}),
  expireInSeconds: 2,
  retryLimit: 2,
  run: async () => {
    process.stdout.write(`${runner.name} begins\n`);
    await new Promise((resolve) => setTimeout(resolve, runner.takesMs));
    process.stdout.write(`${runner.name} ends\n`);
  },
});
