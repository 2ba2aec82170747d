import type { Knex } from 'knex'

/** Somebody who stood in the list twice: the entry that was given up points at the one that stays. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.alterTable('people', (table) => {
    table.text('merged_into').references('people.id')
  })
}

export async function down(knex: Knex): Promise<void> {
  await knex.schema.alterTable('people', (table) => {
    table.dropColumn('merged_into')
  })
}
