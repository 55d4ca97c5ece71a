import {type EntityManager} from 'typeorm';
import {type AppParts} from '../../app-parts';
import {type Caller} from '../../caller';
import {AppError} from '../../errors';
import {notify} from '../../events/notify';
import {ExerciseService, type PublishedExercise} from '../exercises/exercise-service';
import {AttemptEntity} from './attempt-entity';

/** What the client decides when it starts. */
export interface AttemptDraft {
  readonly exerciseId: string;
  readonly writerKey: string;
}

/** Attempts begun and taken over, by those whose they are. */
export class AttemptService {
  private readonly exercises: ExerciseService;

  constructor(private readonly parts: Pick<AppParts, 'db' | 'now'>) {
    this.exercises = new ExerciseService(parts.db);
  }

  /** Begins an attempt under the client's id; the same again changes nothing. */
  async start(caller: Caller, id: string, draft: AttemptDraft): Promise<void> {
    await this.parts.db.transaction(async (manager) => {
      // One person's starts take turns, else two at once could pass the limit of tries.
      await manager.query('select pg_advisory_xact_lock(hashtextextended($1, 0))', [
        `start ${caller.personId}`,
      ]);
      if (await this.isStarted(manager, caller, id, draft)) return;
      const published = await this.exercises.getPublished(caller, draft.exerciseId, manager);
      await this.checkTries(manager, caller, published);
      await this.insert(manager, caller, id, draft, published);
    });
  }

  /** From now on this key writes; the old one is refused. */
  async takeOver(caller: Caller, id: string, writerKey: string): Promise<void> {
    await this.parts.db.transaction(async (manager) => {
      const attempt = await this.lockOwn(manager, caller, id);
      if (attempt.writerKey === writerKey) return;
      if (attempt.state !== 'running') {
        throw new AppError('attempt-over', {detail: 'The attempt has been handed in.'});
      }
      const {organisationId} = caller;
      await manager.getRepository(AttemptEntity).update({id, organisationId}, {writerKey});
      await notify(manager, organisationId, `attempt:${id}`, 'writer-changed', id);
    });
  }

  /** The caller's own attempt, held until the transaction ends. */
  async lockOwn(manager: EntityManager, caller: Caller, id: string): Promise<AttemptEntity> {
    const {organisationId, personId} = caller;
    const attempt = await manager.getRepository(AttemptEntity).findOne({
      where: {id, organisationId, personId},
      lock: {mode: 'pessimistic_write'},
    });
    if (!attempt) throw noAttempt();
    return attempt;
  }

  async getOwn({organisationId, personId}: Caller, id: string): Promise<AttemptEntity> {
    const attempt = await this.parts.db
      .getRepository(AttemptEntity)
      .findOneBy({id, organisationId, personId});
    if (!attempt) throw noAttempt();
    return attempt;
  }

  /** Whether this very start was done before. */
  private async isStarted(
    manager: EntityManager,
    {organisationId, personId}: Caller,
    id: string,
    {exerciseId, writerKey}: AttemptDraft,
  ): Promise<boolean> {
    const attempt = await manager.getRepository(AttemptEntity).findOneBy({id});
    if (!attempt) return false;
    if (attempt.organisationId !== organisationId || attempt.personId !== personId)
      throw noAttempt();
    if (attempt.exerciseId !== exerciseId)
      throw new AppError('in-use', {
        detail: 'This id is the one of an attempt at another exercise.',
      });
    if (attempt.writerKey !== writerKey)
      throw new AppError('writer-changed', {
        detail: 'The attempt goes on in another window or on another device.',
      });
    return true;
  }

  private async checkTries(
    manager: EntityManager,
    {organisationId, personId}: Caller,
    {exerciseId, exercise}: PublishedExercise,
  ): Promise<void> {
    const {tries} = exercise.limits;
    if (tries === null) return;
    const made = await manager
      .getRepository(AttemptEntity)
      .countBy({organisationId, personId, exerciseId});
    if (made < tries) return;
    throw new AppError('not-allowed', {
      detail: `This exercise may be tried ${tries} times, and it was.`,
    });
  }

  private async insert(
    manager: EntityManager,
    {organisationId, personId}: Caller,
    id: string,
    {exerciseId, writerKey}: AttemptDraft,
    {versionId, exercise}: PublishedExercise,
  ): Promise<void> {
    const inserted = await manager
      .getRepository(AttemptEntity)
      .createQueryBuilder()
      .insert()
      .values({
        id,
        organisationId,
        personId,
        exerciseId,
        exerciseVersionId: versionId,
        state: 'running',
        seed: exercise.scenario.seed, // practice: the same for everybody
        writerKey,
        startedAt: this.parts.now(),
      })
      .orIgnore()
      .returning('id')
      .execute();
    if ((inserted.raw as unknown[]).length === 0) throw noAttempt(); // somebody else's, made this very moment
    await notify(manager, organisationId, 'attempts', 'started', id);
  }
}

/** Somebody else's and none at all are the same to the caller. */
function noAttempt(): AppError {
  return new AppError('not-found', {detail: 'There is no such attempt.'});
}
