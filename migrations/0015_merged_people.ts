import type { Knex } from 'knex'

/**
 * Somebody who stood in the list twice: the entry that was given up points at the one that stays. Without a foreign key,
 * because SQLite would then have to make the table anew, and everything else points at it.
 */
export async function up(knex: Knex): Promise<void> {
  await knex.raw('alter table people add column merged_into text')
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('alter table people drop column merged_into')
}
