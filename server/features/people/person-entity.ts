import {Check, Column, Entity, JoinColumn, ManyToOne, Unique} from 'typeorm';
import {type Role} from '#shared/permissions';
import {type Preferences} from '#shared/session/session';
import {TenantColumns} from '../../db/base-columns';
import {type OrganisationEntity} from './organisation-entity';

/** Somebody who can sign in: one person, one organisation, one role. */
@Entity('person')
@Unique(['organisationId', 'id'])
@Check('person_email_check', 'email = lower(email)')
@Check('person_role_check', "role in ('trainee', 'technician', 'instructor', 'administrator')")
export class PersonEntity extends TenantColumns {
  /** Lower case; unique over all organisations. */
  @Column({type: 'text', unique: true})
  email!: string;

  @Column({type: 'text'})
  name!: string;

  @Column({type: 'text'})
  role!: Role;

  @Column({type: 'text'})
  passwordHash!: string;

  /** The person's number in the organisation's own systems. */
  @Column({type: 'text', nullable: true})
  externalId!: string | null;

  /** Whether the person may sign in; one who leaves is kept, with the scores. */
  @Column({type: 'boolean', default: true})
  active!: boolean;

  @Column({type: 'jsonb', default: {units: 'si', theme: 'system'}})
  preferences!: Preferences;

  @ManyToOne('OrganisationEntity', {onDelete: 'RESTRICT', nullable: false})
  @JoinColumn({name: 'organisation_id'})
  organisation!: OrganisationEntity;
}
