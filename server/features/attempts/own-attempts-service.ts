import {type DataSource} from 'typeorm';
import {type ExerciseSummary} from '#shared/exercises/exercise';
import {type Caller} from '../../caller';
import {AttemptEntity} from './attempt-entity';
import {AttemptResultEntity} from './attempt-result-entity';

interface StandingRow {
  readonly exerciseId: string;
  readonly count: number;
  readonly best: number | null;
  readonly hasPassed: boolean;
  readonly openAttemptId: string | null;
}

/** How the caller stands at each exercise. */
export class OwnAttemptsService {
  constructor(private readonly db: DataSource) {}

  /** By exercise; one never tried is not in it. */
  async standings({
    organisationId,
    personId,
  }: Caller): Promise<ReadonlyMap<string, ExerciseSummary['mine']>> {
    const rows = await this.db
      .getRepository(AttemptEntity)
      .createQueryBuilder('attempt')
      .leftJoin(
        AttemptResultEntity,
        'result',
        `result.organisation_id = attempt.organisation_id and result.attempt_id = attempt.id
          and result.engine = attempt.engine`,
      )
      .select('attempt.exercise_id', 'exerciseId')
      .addSelect('count(*)::int', 'count')
      .addSelect('max(result.score)', 'best')
      .addSelect('coalesce(bool_or(result.passed), false)', 'hasPassed')
      .addSelect(
        `(array_agg(attempt.id order by attempt.started_at desc, attempt.id desc)
          filter (where attempt.state = 'running'))[1]`,
        'openAttemptId',
      )
      .where({organisationId, personId})
      .groupBy('attempt.exercise_id')
      .getRawMany<StandingRow>();
    return new Map(rows.map(({exerciseId, ...mine}) => [exerciseId, mine]));
  }
}
