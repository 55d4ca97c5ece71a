import {DefaultNamingStrategy, type Table} from 'typeorm';

/** Names as PostgreSQL itself would give them, so that migrations need not spell them out. */
export class PostgresNaming extends DefaultNamingStrategy {
  override columnName(property: string, given: string | undefined, prefixes: string[]): string {
    return snakeCase([...prefixes, given ?? property].join('_'));
  }

  override joinColumnName(relation: string, column: string): string {
    return snakeCase(`${relation}_${column}`);
  }

  override primaryKeyName(table: Table | string): string {
    return `${nameOf(table)}_pkey`;
  }

  override uniqueConstraintName(table: Table | string, columns: string[]): string {
    return `${nameOf(table)}_${columns.join('_')}_key`;
  }

  override foreignKeyName(table: Table | string, columns: string[]): string {
    return `${nameOf(table)}_${columns.join('_')}_fkey`;
  }

  override indexName(table: Table | string, columns: string[]): string {
    return `${nameOf(table)}_${columns.join('_')}_idx`;
  }
}

function nameOf(table: Table | string): string {
  const name = typeof table === 'string' ? table : table.name;
  return name.replace(/^.*\./, ''); // without the schema
}

function snakeCase(name: string): string {
  return name.replace(/[A-Z]/g, (letter) => `_${letter.toLowerCase()}`);
}
