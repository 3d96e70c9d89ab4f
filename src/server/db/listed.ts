import { sql, type AliasedRawBuilder } from 'kysely';

/** A list of texts as a table with the column `value`: one parameter, however long the list is. */
export function listed(values: readonly string[]): AliasedRawBuilder<{ value: string }, 'listed'> {
  return sql<{ value: string }>`json_each(${JSON.stringify(values)})`.as<'listed'>('listed');
}
