import {type DataSource, type SelectQueryBuilder} from 'typeorm';
import type * as z from 'zod';
import {type listAttempts, type listOwnAttempts} from '#shared/attempts/attempt';
import {may} from '#shared/permissions';
import {type Caller} from '../../caller';
import {AppError} from '../../errors';
import {ExerciseService} from '../exercises/exercise-service';
import {AttemptEntity} from './attempt-entity';
import {type AttemptReply, type SummaryReply, toAttempt, toSummary} from './attempt-mapper';
import {containing, readCursor, writeCursor} from './attempt-page';
import {AttemptResultEntity} from './attempt-result-entity';
import {attemptsCsv} from './attempts-csv';

type OwnQuery = z.output<typeof listOwnAttempts.input>['query'];
type Query = z.output<typeof listAttempts.input>['query'];
type Select = SelectQueryBuilder<AttemptEntity>;

export interface AttemptPage {
  readonly items: SummaryReply[];
  readonly nextCursor: string | null;
}

/** Attempts to be looked at: one's own, and others' for those who may. */
export class AttemptReadService {
  private readonly exercises: ExerciseService;

  constructor(private readonly db: DataSource) {
    this.exercises = new ExerciseService(db);
  }

  /** Own, or any of the organisation for those who may read others'. */
  async get(caller: Caller, id: string): Promise<AttemptReply> {
    const attempt = await this.getReadable(caller, id);
    const exercise = await this.exercises.getVersion(caller, attempt.exerciseVersionId);
    return toAttempt(attempt, this.exercises.toRun(exercise));
  }

  async getReadable(caller: Caller, id: string): Promise<AttemptEntity> {
    const attempt = await this.readable(caller).andWhere('attempt.id = :id', {id}).getOne();
    if (!attempt) throw noAttempt();
    return attempt;
  }

  /** Whether the caller may be told when this attempt changes. */
  async mayRead(caller: Caller, id: string): Promise<boolean> {
    return (await this.readable(caller).andWhere('attempt.id = :id', {id}).getCount()) > 0;
  }

  /** The caller's own, newest first. */
  listOwn(caller: Caller, query: OwnQuery): Promise<AttemptPage> {
    return this.page(this.ofPerson(caller), query);
  }

  /** Everybody's in the organisation, newest first; `q` is looked for in person and title. */
  list(caller: Caller, {q, ...query}: Query): Promise<AttemptPage> {
    const select = this.ofOrganisation(caller);
    if (q !== undefined) {
      select.andWhere('(person.name ilike :q or version.title ilike :q)', {q: containing(q)});
    }
    return this.page(select, query);
  }

  /** The whole list as a table. */
  async exportCsv(caller: Caller): Promise<string> {
    const attempts = await newestFirst(this.ofOrganisation(caller)).getMany();
    return attemptsCsv(attempts.map(toSummary));
  }

  private async page(select: Select, {cursor, limit, exerciseId}: OwnQuery): Promise<AttemptPage> {
    if (exerciseId !== undefined)
      select.andWhere('attempt.exercise_id = :exerciseId', {exerciseId});
    if (cursor !== undefined)
      select.andWhere('(attempt.started_at, attempt.id) < (:startedAt, :id)', readCursor(cursor));
    const rows = await newestFirst(select)
      .limit(limit + 1)
      .getMany();
    const attempts = rows.slice(0, limit);
    const last = attempts.at(-1);
    const nextCursor = rows.length > limit && last ? writeCursor(last) : null;
    return {items: attempts.map(toSummary), nextCursor};
  }

  private readable(caller: Caller): Select {
    return may(caller.role, 'attempts:read-others')
      ? this.ofOrganisation(caller)
      : this.ofPerson(caller);
  }

  private ofPerson(caller: Caller): Select {
    const {personId} = caller;
    return this.ofOrganisation(caller).andWhere('attempt.person_id = :personId', {personId});
  }

  /** With what a list shows of person, exercise and result; without the documents. */
  private ofOrganisation({organisationId}: Caller): Select {
    return this.db
      .getRepository(AttemptEntity)
      .createQueryBuilder('attempt')
      .innerJoin('attempt.person', 'person')
      .innerJoin('attempt.exercise', 'exercise')
      .innerJoin('attempt.exerciseVersion', 'version')
      .leftJoinAndMapOne(
        'attempt.result',
        AttemptResultEntity,
        'result',
        `result.organisation_id = attempt.organisation_id and result.attempt_id = attempt.id
          and result.engine = attempt.engine`,
      )
      .addSelect(['person.id', 'person.name', 'exercise.id', 'exercise.number'])
      .addSelect(['version.id', 'version.title'])
      .where('attempt.organisation_id = :organisationId', {organisationId});
  }
}

function newestFirst(select: Select): Select {
  return select.orderBy('attempt.startedAt', 'DESC').addOrderBy('attempt.id', 'DESC');
}

/** Somebody else's and none at all are the same to the caller. */
function noAttempt(): AppError {
  return new AppError('not-found', {detail: 'There is no such attempt.'});
}
