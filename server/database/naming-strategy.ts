import { DefaultNamingStrategy, type NamingStrategyInterface, type Table } from 'typeorm';

function snakeCase(name: string): string {
  return name.replace(/([a-z0-9])([A-Z])/g, '$1_$2').toLowerCase();
}
function tableOf(table: Table | string): string {
  const name = typeof table === 'string' ? table : table.name;
  return name.slice(name.lastIndexOf('.') + 1);
}

/** snake_case columns, and constraint names as PostgreSQL itself would give them, so that migrations can be read. */
export class SnakeNamingStrategy extends DefaultNamingStrategy implements NamingStrategyInterface {
  override columnName(propertyName: string, customName: string | undefined, prefixes: string[]): string {
    return snakeCase([...prefixes, customName ?? propertyName].join('_'));
  }
  override joinColumnName(relationName: string, referencedColumnName: string): string {
    return snakeCase(`${relationName}_${referencedColumnName}`);
  }
  override primaryKeyName(table: Table | string): string {
    return `${tableOf(table)}_pkey`;
  }
  override foreignKeyName(table: Table | string, columns: string[]): string {
    return `${tableOf(table)}_${columns.map(snakeCase).join('_')}_fkey`;
  }
  override uniqueConstraintName(table: Table | string, columns: string[]): string {
    return `${tableOf(table)}_${columns.map(snakeCase).join('_')}_key`;
  }
  override indexName(table: Table | { name: string } | string, columns: string[]): string {
    return `${tableOf(table as Table)}_${columns.map(snakeCase).join('_')}_idx`;
  }
}
