import {Check, Column, Entity, JoinColumn, ManyToOne, Unique} from 'typeorm';
import {TenantColumns} from '../../db/base-columns';

export type ExerciseState = 'draft' | 'published' | 'archived';

/** An exercise of one organisation's library; what it asks is in its versions. */
@Entity('exercise')
@Unique(['organisationId', 'id'])
@Unique(['organisationId', 'number'])
@Check('exercise_state_check', "state in ('draft', 'published', 'archived')")
export class ExerciseEntity extends TenantColumns {
  /** Its number in the library. */
  @Column({type: 'integer'})
  number!: number;

  @Column({type: 'text', default: 'draft'})
  state!: ExerciseState;

  @Column({type: 'integer', default: 1})
  version!: number;

  @ManyToOne('OrganisationEntity', {onDelete: 'RESTRICT', nullable: false})
  @JoinColumn({name: 'organisation_id'})
  organisation!: {readonly id: string};
}
