import {Column, CreateDateColumn, PrimaryColumn, UpdateDateColumn} from 'typeorm';

/** Milliseconds, as a Date has them: a keyset cursor made from one must find its row again. */
const TIME = {type: 'timestamptz', precision: 3} as const;

/** Columns of every table. The id is made by us (`newId`) or, where a call may be repeated, by the client. */
export abstract class BaseColumns {
  @PrimaryColumn({type: 'uuid'})
  id!: string;

  @CreateDateColumn(TIME)
  createdAt!: Date;

  @UpdateDateColumn(TIME)
  updatedAt!: Date;
}

/**
 * Columns of every table that belongs to one organisation. Each such table has `unique (organisation_id, id)` and
 * its references to others are composite, so that the database refuses a link across organisations.
 */
export abstract class TenantColumns extends BaseColumns {
  @Column({type: 'uuid'})
  organisationId!: string;
}
