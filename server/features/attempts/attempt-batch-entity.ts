import {Column, Entity, JoinColumn, ManyToOne, Unique} from 'typeorm';
import {type LogEntry} from '#sim-core/index';
import {TenantColumns} from '../../db/base-columns';

/** One piece of an attempt's log, as it came. Never changed. */
@Entity('attempt_batch')
@Unique(['organisationId', 'id'])
@Unique(['organisationId', 'attemptId', 'number'])
export class AttemptBatchEntity extends TenantColumns {
  @Column({type: 'uuid'})
  attemptId!: string;

  /** Counts from 1 without gaps. */
  @Column({type: 'integer'})
  number!: number;

  /** How far the simulation was when it was sent. */
  @Column({type: 'integer'})
  throughTick!: number;

  @Column({type: 'jsonb'})
  entries!: LogEntry[];

  @ManyToOne('OrganisationEntity', {onDelete: 'RESTRICT', nullable: false})
  @JoinColumn({name: 'organisation_id'})
  organisation!: {readonly id: string};

  @ManyToOne('AttemptEntity', {onDelete: 'RESTRICT', nullable: false})
  @JoinColumn([
    {
      name: 'organisation_id',
      referencedColumnName: 'organisationId',
      foreignKeyConstraintName: 'attempt_batch_organisation_id_attempt_id_fkey',
    },
    {name: 'attempt_id', referencedColumnName: 'id'},
  ])
  attempt!: {readonly id: string};
}
