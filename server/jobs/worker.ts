import {type Job, type WorkerParts} from './job';
import {makeBoss} from './boss';
import {QueueLoop} from './queue-loop';
import {givenUpQueue} from './queues';

/** How often the work of dead workers is given back [s]; pg-boss would wait two minutes. */
const UPKEEP_S = 5;
/** What runs at a shutdown may end within this [ms]; then it is given to another worker. */
const END_WITHIN_MS = 20_000;

/** A worker that runs. */
export interface Worker {
  readonly stop: () => Promise<void>;
}

/** Works off the queues of `jobs` until stopped. */
export async function startWorker(
  jobs: readonly Job[],
  parts: WorkerParts,
  upkeepS = UPKEEP_S,
): Promise<Worker> {
  const {config, log} = parts;
  const boss = makeBoss({url: config.databaseUrl, log, upkeepS});
  await boss.start();
  const loops = jobs.flatMap((job) => {
    const run = (data: unknown): Promise<void> => job.run(job.data.parse(data), parts);
    const giveUp = async (data: unknown): Promise<void> =>
      job.givenUp?.(job.data.parse(data), parts);
    return [
      new QueueLoop(boss, job.name, run, log),
      new QueueLoop(boss, givenUpQueue(job), giveUp, log),
    ];
  });
  for (const loop of loops) loop.start();
  const stop = async (): Promise<void> => {
    await Promise.all(loops.map((loop) => loop.stop(END_WITHIN_MS)));
    await boss.stop({graceful: false});
    for (const job of jobs) await job.close?.();
  };
  return {stop};
}
