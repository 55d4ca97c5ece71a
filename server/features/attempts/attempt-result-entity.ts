import {Column, Entity, JoinColumn, ManyToOne, Unique} from 'typeorm';
import {type CriterionResult} from '#sim-core/index';
import {TenantColumns} from '../../db/base-columns';

/** What the replay of an attempt's stored log gave on one engine. */
@Entity('attempt_result')
@Unique(['organisationId', 'id'])
@Unique(['organisationId', 'attemptId', 'engine'])
export class AttemptResultEntity extends TenantColumns {
  @Column({type: 'uuid'})
  attemptId!: string;

  @Column({type: 'integer'})
  engine!: number;

  /** 0.0 … 100.0, one decimal. */
  @Column({type: 'double precision'})
  score!: number;

  @Column({type: 'boolean'})
  passed!: boolean;

  @Column({type: 'jsonb'})
  criteria!: CriterionResult[];

  /** Fingerprint of the replay. */
  @Column({type: 'text'})
  hash!: string;

  /** Whether the browser that ran it reported the same. */
  @Column({type: 'boolean'})
  hashAgrees!: boolean;

  @Column({type: 'timestamptz', precision: 3})
  scoredAt!: Date;

  @ManyToOne('OrganisationEntity', {onDelete: 'RESTRICT', nullable: false})
  @JoinColumn({name: 'organisation_id'})
  organisation!: {readonly id: string};

  @ManyToOne('AttemptEntity', {onDelete: 'RESTRICT', nullable: false})
  @JoinColumn([
    {
      name: 'organisation_id',
      referencedColumnName: 'organisationId',
      foreignKeyConstraintName: 'attempt_result_organisation_id_attempt_id_fkey',
    },
    {name: 'attempt_id', referencedColumnName: 'id'},
  ])
  attempt!: {readonly id: string};
}
