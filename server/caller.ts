import {type Role} from '#shared/permissions';

/** Who is calling, as the database says at this request. Every service takes one first. */
export interface Caller {
  readonly personId: string;
  readonly organisationId: string;
  readonly role: Role;
}
