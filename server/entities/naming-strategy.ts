import { DefaultNamingStrategy, type NamingStrategyInterface, type Table } from 'typeorm';

const snake = (name: string) => name.replace(/([a-z0-9])([A-Z])/g, '$1_$2').toLowerCase();
const tableName = (table: Table | string) => {
  const name = typeof table === 'string' ? table : table.name;
  return name.split('.').pop() ?? name;
};

/** Snake-case names, and constraint names a person can read in an error of the database. */
export class SnakeNamingStrategy extends DefaultNamingStrategy implements NamingStrategyInterface {
  override columnName(property: string, custom: string | undefined, prefixes: string[]): string {
    return [...prefixes, custom ?? property].map(snake).join('_');
  }
  override primaryKeyName(table: Table | string): string {
    return `pk_${tableName(table)}`;
  }
  override foreignKeyName(table: Table | string, columns: string[]): string {
    return `fk_${tableName(table)}_${columns.map(snake).join('_')}`;
  }
  override uniqueConstraintName(table: Table | string, columns: string[]): string {
    return `uq_${tableName(table)}_${columns.map(snake).join('_')}`;
  }
  override indexName(table: Table | string, columns: string[]): string {
    return `ix_${tableName(table)}_${columns.map(snake).join('_')}`;
  }
}
