import {type Pool} from 'pg';
import {type DataSource} from 'typeorm';

/** The pool of an open data source, for packages that speak to PostgreSQL themselves. */
export function poolOf(db: DataSource): Pool {
  return (db.driver as unknown as {master: Pool}).master;
}
