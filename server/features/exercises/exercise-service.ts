import {isDeepStrictEqual} from 'node:util';
import {type DataSource, type EntityManager, type SelectQueryBuilder} from 'typeorm';
import {type LogEntry} from '#sim-core/index';
import {Exercise, type ExerciseToRun} from '#shared/exercises/exercise';
import {type Caller} from '../../caller';
import {newId} from '../../db/new-id';
import {AppError} from '../../errors';
import {ExerciseEntity} from './exercise-entity';
import {toRun} from './exercise-mapper';
import {ExerciseVersionEntity} from './exercise-version-entity';
import {readExerciseDocument} from './read-exercise-document';

/** The version of an exercise that is run at present. */
export interface PublishedExercise {
  readonly exerciseId: string;
  readonly versionId: string;
  readonly exercise: Exercise;
}

/** The exercises of an organisation, version by version. */
export class ExerciseService {
  constructor(private readonly db: DataSource) {}

  /** All published exercises, by their number. */
  async listPublished(caller: Caller): Promise<PublishedExercise[]> {
    const rows = await this.published(caller).orderBy('exercise.number').getMany();
    return rows.map(toPublished);
  }

  async getPublished(
    caller: Caller,
    exerciseId: string,
    manager: EntityManager = this.db.manager,
  ): Promise<PublishedExercise> {
    const row = await this.published(caller, manager)
      .andWhere('version.exercise_id = :exerciseId', {exerciseId})
      .getOne();
    if (!row) throw new AppError('not-found', {detail: 'There is no such exercise.'});
    return toPublished(row);
  }

  /** The exercise as it was when something pinned this version. */
  async getVersion(
    {organisationId}: Pick<Caller, 'organisationId'>,
    id: string,
    manager: EntityManager = this.db.manager,
  ): Promise<Exercise> {
    const {document} = await manager
      .getRepository(ExerciseVersionEntity)
      .findOneByOrFail({id, organisationId});
    return Exercise.parse(document);
  }

  /** What those who run it may see of it. */
  toRun(exercise: Exercise): ExerciseToRun {
    return toRun(exercise);
  }

  /** Publishes a document under its number: a new version, unless it is the one there is. Its id. */
  async publish(
    {organisationId}: Caller,
    document: unknown,
    modelSolution: readonly LogEntry[] | null = null,
  ): Promise<string> {
    const exercise = readExerciseDocument(document);
    return this.db.transaction(async (manager) => {
      const exerciseId = await lockByNumber(manager, organisationId, exercise.number);
      const versions = manager.getRepository(ExerciseVersionEntity);
      const where = {organisationId, exerciseId};
      const last = await versions.findOne({where, order: {number: 'desc'}});
      if (last && isDeepStrictEqual(last.document, asStored(exercise))) return exerciseId;
      await versions.insert({
        ...where,
        id: newId(),
        number: (last?.number ?? 0) + 1,
        title: exercise.title,
        document: exercise,
        modelSolution,
      });
      return exerciseId;
    });
  }

  private published(
    {organisationId}: Caller,
    manager: EntityManager = this.db.manager,
  ): SelectQueryBuilder<ExerciseVersionEntity> {
    return manager
      .getRepository(ExerciseVersionEntity)
      .createQueryBuilder('version')
      .innerJoin('version.exercise', 'exercise')
      .where('version.organisation_id = :organisationId', {organisationId})
      .andWhere("exercise.state = 'published'")
      .andWhere(
        `version.number = (select max(other.number) from exercise_version other
          where other.organisation_id = version.organisation_id
            and other.exercise_id = version.exercise_id)`,
      );
  }
}

/** The exercise of this number, made and published; two who publish at once take turns at its row. */
async function lockByNumber(
  manager: EntityManager,
  organisationId: string,
  number: number,
): Promise<string> {
  const exercises = manager.getRepository(ExerciseEntity);
  await exercises
    .createQueryBuilder()
    .insert()
    .values({id: newId(), organisationId, number, state: 'published'})
    .orIgnore()
    .execute();
  const {id} = await exercises.findOneOrFail({
    where: {organisationId, number},
    lock: {mode: 'pessimistic_write'},
  });
  await exercises.update({id, organisationId}, {state: 'published'});
  return id;
}

function toPublished({id, exerciseId, document}: ExerciseVersionEntity): PublishedExercise {
  return {exerciseId, versionId: id, exercise: Exercise.parse(document)};
}

/** As JSON comes back from the database: without keys that hold nothing. */
function asStored(document: object): unknown {
  return JSON.parse(JSON.stringify(document));
}
