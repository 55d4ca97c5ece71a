import type PgBoss from 'pg-boss';
import {type EntityManager} from 'typeorm';
import type * as z from 'zod';
import {type Job} from './job';

/** Sends jobs in the transaction of the row they belong to: rolled back with it, never seen before it. */
export class JobSender {
  constructor(private readonly boss: Pick<PgBoss, 'send'>) {}

  async send<D extends z.ZodType>(
    manager: EntityManager,
    job: Job<D>,
    data: z.input<D>,
  ): Promise<void> {
    const executeSql = async (text: string, values: unknown[]): Promise<{rows: unknown[]}> => ({
      rows: await manager.query<unknown[]>(text, values),
    });
    const id = await this.boss.send(job.name, job.data.parse(data) as object, {db: {executeSql}});
    if (id === null) throw new Error(`no queue named ${job.name}: has the owner migrated?`);
  }
}
