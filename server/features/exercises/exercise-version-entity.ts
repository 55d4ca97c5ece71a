import {Column, Entity, JoinColumn, ManyToOne, Unique} from 'typeorm';
import {TenantColumns} from '../../db/base-columns';
import {type ExerciseEntity} from './exercise-entity';

/** One published wording of an exercise. Never changed: attempts pin the version they were made at. */
@Entity('exercise_version')
@Unique(['organisationId', 'id'])
@Unique(['organisationId', 'exerciseId', 'number'])
export class ExerciseVersionEntity extends TenantColumns {
  @Column({type: 'uuid'})
  exerciseId!: string;

  /** Counts from 1; the highest is the one that is run. */
  @Column({type: 'integer'})
  number!: number;

  /** Title in the document, to be searched for. */
  @Column({type: 'text'})
  title!: string;

  /** `evenspan.exercise/<n>`. */
  @Column({type: 'jsonb'})
  document!: object;

  /** A log that passes; not told to those who run. */
  @Column({type: 'jsonb', nullable: true})
  modelSolution!: object | null;

  /** What the check before publishing found. */
  @Column({type: 'jsonb', nullable: true})
  checkReport!: object | null;

  @ManyToOne('OrganisationEntity', {onDelete: 'RESTRICT', nullable: false})
  @JoinColumn({name: 'organisation_id'})
  organisation!: {readonly id: string};

  @ManyToOne('ExerciseEntity', {onDelete: 'RESTRICT', nullable: false})
  @JoinColumn([
    {
      name: 'organisation_id',
      referencedColumnName: 'organisationId',
      foreignKeyConstraintName: 'exercise_version_organisation_id_exercise_id_fkey',
    },
    {name: 'exercise_id', referencedColumnName: 'id'},
  ])
  exercise!: ExerciseEntity;
}
