import {Column, Entity} from 'typeorm';
import {BaseColumns} from '../../db/base-columns';

/** A firm that uses Evenspan; it sees only its own rows. */
@Entity('organisation')
export class OrganisationEntity extends BaseColumns {
  @Column({type: 'text'})
  name!: string;

  /** Whether it was made to try things out. */
  @Column({type: 'boolean', default: false})
  isDemo!: boolean;
}
