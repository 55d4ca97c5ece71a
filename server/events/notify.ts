import {type EntityManager} from 'typeorm';

/** Channel of PostgreSQL on which all instances listen. */
export const CHANNEL = 'evenspan_events';

/** What travels: ids only, since PostgreSQL takes at most 8000 bytes. */
export interface Notice {
  readonly organisationId: string;
  readonly topic: string;
  readonly kind: string;
  readonly id: string;
}

/** Tells all who follow `topic`, once the transaction of `manager` is committed. */
export async function notify(
  manager: EntityManager,
  organisationId: string,
  topic: string,
  kind: string,
  id: string,
): Promise<void> {
  const notice: Notice = {organisationId, topic, kind, id};
  await manager.query('select pg_notify($1, $2)', [CHANNEL, JSON.stringify(notice)]);
}
