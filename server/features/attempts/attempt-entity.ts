import {Check, Column, Entity, Index, JoinColumn, ManyToOne, Unique} from 'typeorm';
import {type AttemptState} from '#shared/attempts/attempt';
import {TenantColumns} from '../../db/base-columns';
import {type AttemptResultEntity} from './attempt-result-entity';

/** PostgreSQL's bigint arrives as text; a seed is below 2³². */
const seedNumber = {from: (text: string) => Number(text), to: (seed: number) => seed};

/** One person's try at one version of an exercise: where its log stands and how far it has come. */
@Entity('attempt')
@Unique(['organisationId', 'id'])
@Check('attempt_state_check', "state in ('running', 'handed-in', 'scored', 'failed')")
@Index(['organisationId', 'startedAt', 'id'])
@Index(['organisationId', 'personId', 'startedAt', 'id'])
@Index(['organisationId', 'exerciseId'])
@Index(['organisationId', 'exerciseVersionId'])
export class AttemptEntity extends TenantColumns {
  @Column({type: 'uuid'})
  personId!: string;

  @Column({type: 'uuid'})
  exerciseId!: string;

  /** The version it is run and scored by, whatever is published later. */
  @Column({type: 'uuid'})
  exerciseVersionId!: string;

  @Column({type: 'text'})
  state!: AttemptState;

  /** Stands for the scenario's own. */
  @Column({type: 'bigint', transformer: seedNumber})
  seed!: number;

  /** Who may write to the log at present. */
  @Column({type: 'uuid'})
  writerKey!: string;

  @Column({type: 'timestamptz', precision: 3})
  startedAt!: Date;

  @Column({type: 'timestamptz', precision: 3, nullable: true})
  handedInAt!: Date | null;

  /** Number of the last batch stored; 0 before the first. */
  @Column({type: 'integer', default: 0})
  lastBatch!: number;

  /** `n` of the last entry stored. */
  @Column({type: 'integer', default: 0})
  lastEntry!: number;

  /** Tick of the last entry stored. */
  @Column({type: 'integer', default: 0})
  lastEntryTick!: number;

  /** Last tick known of, from batches and beats. */
  @Column({type: 'integer', default: 0})
  throughTick!: number;

  /** When a beat was stored last. */
  @Column({type: 'timestamptz', precision: 3, nullable: true})
  beatAt!: Date | null;

  /** Engine number of the result that counts. */
  @Column({type: 'integer', nullable: true})
  engine!: number | null;

  /** Why the last try at scoring went wrong. */
  @Column({type: 'text', nullable: true})
  failure!: string | null;

  @ManyToOne('OrganisationEntity', {onDelete: 'RESTRICT', nullable: false})
  @JoinColumn({name: 'organisation_id'})
  organisation!: {readonly id: string};

  @ManyToOne('PersonEntity', {onDelete: 'RESTRICT', nullable: false})
  @JoinColumn([
    {
      name: 'organisation_id',
      referencedColumnName: 'organisationId',
      foreignKeyConstraintName: 'attempt_organisation_id_person_id_fkey',
    },
    {name: 'person_id', referencedColumnName: 'id'},
  ])
  person!: {readonly id: string; readonly name: string};

  @ManyToOne('ExerciseEntity', {onDelete: 'RESTRICT', nullable: false})
  @JoinColumn([
    {
      name: 'organisation_id',
      referencedColumnName: 'organisationId',
      foreignKeyConstraintName: 'attempt_organisation_id_exercise_id_fkey',
    },
    {name: 'exercise_id', referencedColumnName: 'id'},
  ])
  exercise!: {readonly id: string; readonly number: number};

  @ManyToOne('ExerciseVersionEntity', {onDelete: 'RESTRICT', nullable: false})
  @JoinColumn([
    {
      name: 'organisation_id',
      referencedColumnName: 'organisationId',
      foreignKeyConstraintName: 'attempt_organisation_id_exercise_version_id_fkey',
    },
    {name: 'exercise_version_id', referencedColumnName: 'id'},
  ])
  exerciseVersion!: {readonly id: string; readonly title: string};

  /** The result of `engine`, where the query joins it. */
  readonly result?: AttemptResultEntity | null;
}
