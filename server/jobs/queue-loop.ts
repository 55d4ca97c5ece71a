import type PgBoss from 'pg-boss';
import {type Logger} from 'pino';

/** Pause between looks into an empty queue [ms]. */
const POLL_MS = 500;
/** Jobs of one queue at work at once in one process. */
const BATCH_SIZE = 10;

type Boss = Pick<PgBoss, 'fetch' | 'complete' | 'fail'>;

/**
 * Works off one queue. Unlike pg-boss's own loop it settles every job by itself, so that one that fails takes no
 * other with it, and looks again at once whenever one is done.
 */
export class QueueLoop {
  /** Jobs at work, by id. */
  private readonly atWork = new Map<string, Promise<void>>();
  private isStopping = false;
  private wake: () => void = () => undefined;
  private ended: Promise<void> = Promise.resolve();

  constructor(
    private readonly boss: Boss,
    private readonly queue: string,
    private readonly run: (data: unknown) => Promise<void>,
    private readonly log: Logger,
  ) {}

  start(): void {
    this.ended = this.loop();
  }

  /** Takes no more jobs, waits for those at work, and gives back what takes longer than `withinMs`. */
  async stop(withinMs: number): Promise<void> {
    this.isStopping = true;
    this.wake();
    await this.ended;
    await Promise.race([Promise.all(this.atWork.values()), sleep(withinMs)]);
    if (this.atWork.size === 0) return;
    await this.boss.fail(this.queue, [...this.atWork.keys()]);
  }

  private async loop(): Promise<void> {
    while (!this.isStopping) {
      const free = BATCH_SIZE - this.atWork.size;
      const jobs = free > 0 ? await this.boss.fetch(this.queue, {batchSize: free}) : [];
      for (const job of jobs) this.begin(job);
      await this.rest();
    }
  }

  /** Until a job is done, or the next look is due. */
  private rest(): Promise<void> {
    if (this.isStopping) return Promise.resolve();
    return new Promise((resolve) => {
      const timer = setTimeout(resolve, POLL_MS);
      this.wake = () => {
        clearTimeout(timer);
        resolve();
      };
    });
  }

  private begin({id, data}: {id: string; data: unknown}): void {
    const work = this.settle(id, data).finally(() => {
      this.atWork.delete(id);
      this.wake();
    });
    this.atWork.set(id, work);
  }

  private async settle(id: string, data: unknown): Promise<void> {
    try {
      await this.run(data);
    } catch (error) {
      this.log.error({err: error, queue: this.queue, job: id}, 'job failed');
      await this.tell(() => this.boss.fail(this.queue, id, {message: String(error)}));
      return;
    }
    await this.tell(() => this.boss.complete(this.queue, id));
  }

  /** A job whose end cannot be told expires and is done again; the loop goes on. */
  private async tell(say: () => Promise<void>): Promise<void> {
    try {
      await say();
    } catch (error) {
      this.log.error({err: error, queue: this.queue}, 'the end of a job could not be told'); // database gone
    }
  }
}

function sleep(ms: number): Promise<void> {
  return new Promise((resolve) => setTimeout(resolve, ms).unref());
}
