import {type DataSource, type EntityManager} from 'typeorm';
import {type Logger} from 'pino';
import {type LogEntry} from '#sim-core/index';
import {newId} from '../../db/new-id';
import {notify} from '../../events/notify';
import {type ReplayAnswer, type Replayer, type ReplayWork} from '../../jobs/replay';
import {ExerciseService} from '../exercises/exercise-service';
import {AttemptBatchEntity} from './attempt-batch-entity';
import {AttemptEntity} from './attempt-entity';
import {AttemptResultEntity} from './attempt-result-entity';

export interface ScoringParts {
  readonly db: DataSource;
  readonly log: Logger;
  readonly now: () => Date;
}

/** Which attempt; a job has no caller. */
export interface AttemptKey {
  readonly organisationId: string;
  readonly attemptId: string;
}

type Scored = Extract<ReplayAnswer, {kind: 'scored'}>;
const NO_REASON = 'The run could not be scored. It is kept and can be scored later.';

/** For the scoring job alone: what an attempt is worth comes from its stored log and nothing else. */
export class ScoringService {
  constructor(private readonly parts: ScoringParts) {}

  /** Doing it twice leaves one result. Throwing means: try again later. */
  async score(key: AttemptKey, replay: Replayer): Promise<void> {
    const {organisationId, attemptId: id} = key;
    const attempt = await this.parts.db
      .getRepository(AttemptEntity)
      .findOneBy({id, organisationId});
    if (!attempt || attempt.state === 'running') return;
    const entries = await this.readLog(key);
    const end = entries.at(-1);
    if (end?.kind !== 'end') throw new Error(`the log of attempt ${id} has no end`);

    const answer = await this.tryReplay(key, replay, await this.workOf(attempt, entries));
    if (answer.kind === 'scored') await this.store(key, answer, end.hash);
    else await this.fail(key, `The run could not be run again: ${answer.reason}`);
  }

  /** The last try has failed. */
  async giveUp(key: AttemptKey): Promise<void> {
    await this.fail(key, null);
  }

  private async readLog({organisationId, attemptId}: AttemptKey): Promise<LogEntry[]> {
    const batches = await this.parts.db
      .getRepository(AttemptBatchEntity)
      .find({where: {organisationId, attemptId}, order: {number: 'asc'}});
    return batches.flatMap(({entries}) => entries);
  }

  private async workOf(attempt: AttemptEntity, entries: LogEntry[]): Promise<ReplayWork> {
    const exercises = new ExerciseService(this.parts.db);
    const exercise = await exercises.getVersion(attempt, attempt.exerciseVersionId);
    const {scenario, target, criteria, passMark} = exercise;
    return {
      exercise: {scenario: {...scenario, seed: attempt.seed}, target, criteria, passMark},
      entries,
      throughTick: entries.at(-1)?.tick ?? 0,
    };
  }

  /** Keeps why it failed, for when it is given up. */
  private async tryReplay(
    {organisationId, attemptId}: AttemptKey,
    replay: Replayer,
    work: ReplayWork,
  ): Promise<ReplayAnswer> {
    try {
      return await replay(work);
    } catch (error) {
      // ReplayLimitError, or a thread that broke: the job is tried again
      const isLimit = error instanceof Error && error.name === 'ReplayLimitError';
      await this.parts.db
        .getRepository(AttemptEntity)
        .update({id: attemptId, organisationId}, {failure: isLimit ? error.message : NO_REASON});
      throw error;
    }
  }

  private async store(key: AttemptKey, {score, hash, engine}: Scored, told: string): Promise<void> {
    const {organisationId, attemptId} = key;
    const hashAgrees = hash === told;
    if (!hashAgrees)
      this.parts.log.error({attemptId, engine, hash, told}, 'browser and replay differ');
    await this.parts.db.transaction(async (manager) => {
      await manager.getRepository(AttemptResultEntity).upsert(
        {
          id: newId(),
          organisationId,
          attemptId,
          engine,
          score: score.score,
          passed: score.passed,
          criteria: [...score.criteria],
          hash,
          hashAgrees,
          scoredAt: this.parts.now(),
        },
        ['organisationId', 'attemptId', 'engine'],
      );
      await this.settle(manager, key, {state: 'scored', engine, failure: null});
    });
  }

  /** A score that is there already stays. */
  private async fail(key: AttemptKey, reason: string | null): Promise<void> {
    await this.parts.db.transaction(async (manager) => {
      const {organisationId, attemptId: id} = key;
      const attempt = await manager
        .getRepository(AttemptEntity)
        .findOne({where: {id, organisationId}, lock: {mode: 'pessimistic_write'}});
      if (attempt?.state !== 'handed-in') return;
      const failure = reason ?? attempt.failure ?? NO_REASON;
      await this.settle(manager, key, {state: 'failed', failure});
    });
  }

  private async settle(
    manager: EntityManager,
    {organisationId, attemptId: id}: AttemptKey,
    change: Pick<AttemptEntity, 'state' | 'failure'> & {engine?: number},
  ): Promise<void> {
    await manager.getRepository(AttemptEntity).update({id, organisationId}, change);
    for (const topic of [`attempt:${id}`, 'attempts'])
      await notify(manager, organisationId, topic, change.state, id);
  }
}
