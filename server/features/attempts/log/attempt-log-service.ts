import {isDeepStrictEqual} from 'node:util';
import {type EntityManager} from 'typeorm';
import type * as z from 'zod';
import {type LogEntry} from '#sim-core/index';
import {type Batch, type Beat, type readAttemptLog, type sendBatch} from '#shared/attempts/attempt';
import {type AppParts} from '../../../app-parts';
import {type Caller} from '../../../caller';
import {newId} from '../../../db/new-id';
import {AppError} from '../../../errors';
import {notify} from '../../../events/notify';
import {scoreAttempt} from '../../../jobs/score-attempt';
import {ExerciseService} from '../../exercises/exercise-service';
import {AttemptBatchEntity} from '../attempt-batch-entity';
import {AttemptEntity} from '../attempt-entity';
import {type AttemptReadService} from '../attempt-read-service';
import {AttemptService} from '../attempt-service';
import {checkBatch, checkBeat} from './batch-rules';

/** Pause between beats [s], which is also how often their tick is stored. */
const BEAT_S = 10;

type BatchReply = z.input<typeof sendBatch.reply>;
type LogParts = Pick<AppParts, 'db' | 'jobs' | 'now'>;

/** How the log of an attempt reaches us: in batches, each stored once and whole, or not at all. */
export class AttemptLogService {
  private readonly attempts: AttemptService;
  private readonly exercises: ExerciseService;

  constructor(
    private readonly parts: LogParts,
    private readonly reader: AttemptReadService,
  ) {
    this.attempts = new AttemptService(parts);
    this.exercises = new ExerciseService(parts.db);
  }

  async getLog(caller: Caller, id: string): Promise<z.input<typeof readAttemptLog.reply>> {
    const {lastBatch, throughTick} = await this.reader.getReadable(caller, id);
    // A batch stored since then is left out: the three must belong together.
    const batches = await this.batchesOf(caller.organisationId, id);
    const entries = batches
      .filter(({number}) => number <= lastBatch)
      .flatMap((batch) => batch.entries);
    return {entries, lastBatch, throughTick};
  }

  addBatch(caller: Caller, id: string, batch: Batch): Promise<BatchReply> {
    return this.parts.db.transaction(async (manager) => {
      const attempt = await this.attempts.lockOwn(manager, caller, id);
      checkWriter(attempt, batch.writerKey);
      const {lastBatch, state} = attempt;
      if (batch.number <= lastBatch) {
        await this.checkSame(manager, attempt, batch);
        return {lastBatch, state};
      }
      checkRunning(attempt);
      if (batch.number > lastBatch + 1) {
        throw new AppError('batch-missing', {
          detail: `Batch ${lastBatch + 1} is the next one.`,
          wanted: lastBatch + 1,
        });
      }
      const exercise = await this.exercises.getVersion(caller, attempt.exerciseVersionId, manager);
      const {lastEntry, lastEntryTick} = attempt;
      checkBatch(batch, exercise, {lastEntry, lastEntryTick, elapsedS: this.elapsedS(attempt)});
      return this.append(manager, attempt, batch);
    });
  }

  async beat(caller: Caller, id: string, {writerKey, throughTick}: Beat): Promise<number> {
    const attempt = await this.attempts.getOwn(caller, id);
    checkWriter(attempt, writerKey);
    checkRunning(attempt);
    const exercise = await this.exercises.getVersion(caller, attempt.exerciseVersionId);
    checkBeat(throughTick, exercise, this.elapsedS(attempt));
    const now = this.parts.now();
    await this.parts.db
      .getRepository(AttemptEntity)
      .createQueryBuilder()
      .update({throughTick: () => 'greatest(through_tick, :throughTick)', beatAt: now})
      .where({id, organisationId: caller.organisationId, state: 'running'})
      .andWhere('(beat_at is null or beat_at <= :before)')
      .setParameters({throughTick, before: new Date(now.getTime() - BEAT_S * 1000)})
      .execute();
    return BEAT_S;
  }

  /** A batch that came again: its answer was lost. How far the simulation was may have changed meanwhile. */
  private async checkSame(
    manager: EntityManager,
    {organisationId, id: attemptId}: AttemptEntity,
    {number, entries}: Batch,
  ): Promise<void> {
    const stored = await manager
      .getRepository(AttemptBatchEntity)
      .findOneByOrFail({organisationId, attemptId, number});
    if (isDeepStrictEqual(stored.entries, asStored(entries))) return;
    throw new AppError('batch-differs', {
      detail: `Batch ${number} was stored with other entries.`,
    });
  }

  private async append(
    manager: EntityManager,
    attempt: AttemptEntity,
    {number, throughTick, entries}: Batch,
  ): Promise<BatchReply> {
    const {organisationId, id} = attempt;
    await manager.getRepository(AttemptBatchEntity).insert({
      id: newId(),
      organisationId,
      attemptId: id,
      number,
      throughTick,
      entries: asStored(entries) as LogEntry[],
    });
    const last = entries.at(-1);
    if (!last) throw new Error('a batch without entries passed the door');
    const isEnd = last.kind === 'end';
    const state = isEnd ? 'handed-in' : 'running';
    await manager.getRepository(AttemptEntity).update(
      {id, organisationId},
      {
        lastBatch: number,
        lastEntry: last.n,
        lastEntryTick: last.tick,
        throughTick: isEnd ? last.tick : Math.max(attempt.throughTick, throughTick),
        ...(isEnd && {state, handedInAt: this.parts.now()}),
      },
    );
    if (isEnd) {
      await this.parts.jobs.send(manager, scoreAttempt, {organisationId, attemptId: id});
      for (const topic of [`attempt:${id}`, 'attempts'])
        await notify(manager, organisationId, topic, state, id);
    }
    return {lastBatch: number, state};
  }

  private batchesOf(organisationId: string, attemptId: string): Promise<AttemptBatchEntity[]> {
    return this.parts.db
      .getRepository(AttemptBatchEntity)
      .find({where: {organisationId, attemptId}, order: {number: 'asc'}});
  }

  private elapsedS({startedAt}: AttemptEntity): number {
    return (this.parts.now().getTime() - startedAt.getTime()) / 1000;
  }
}

function checkWriter(attempt: AttemptEntity, writerKey: string): void {
  if (attempt.writerKey === writerKey) return;
  throw new AppError('writer-changed', {
    detail: 'The attempt goes on in another window or on another device.',
  });
}

function checkRunning({state}: AttemptEntity): void {
  if (state === 'running') return;
  throw new AppError('attempt-over', {detail: 'The attempt has been handed in.'});
}

/** As JSON comes back from the database: no −0, no keys that hold nothing. */
function asStored(entries: Batch['entries']): unknown {
  return JSON.parse(JSON.stringify(entries));
}
