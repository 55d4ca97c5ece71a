import {type Logger} from 'pino';
import {makeBoss} from './boss';
import {type Job} from './job';

/** Wait before another try [s]. */
const RETRY_DELAY_S = 1;

/** Queue of the jobs of which the last try has failed. */
export function givenUpQueue(job: Job): string {
  return `${job.name}-given-up`;
}

/** Makes pg-boss's schema and one queue per job, as their owner. */
export async function makeQueues(
  ownerUrl: string,
  jobs: readonly Job[],
  log: Logger,
): Promise<void> {
  const boss = makeBoss({url: ownerUrl, log, migrates: true});
  await boss.start();
  try {
    for (const job of jobs) {
      const tries = {
        expireInSeconds: job.expireInSeconds,
        retryLimit: job.retryLimit,
        retryDelay: RETRY_DELAY_S,
      };
      const queues = [
        {name: givenUpQueue(job), ...tries},
        {name: job.name, ...tries, deadLetter: givenUpQueue(job)}, // refers to the one before
      ];
      for (const queue of queues) {
        await boss.createQueue(queue.name, queue); // does nothing where it is
        await boss.updateQueue(queue.name, queue);
      }
    }
  } finally {
    await boss.stop({graceful: false});
  }
}
