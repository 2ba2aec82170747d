import type { Knex } from 'knex'

/** Near misses and incidents as they were reported, and what was done about them. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('near_misses', (table) => {
    table.text('id').primary()
    table.text('site_id').notNullable().references('sites.id').onDelete('RESTRICT')
    /** Null when the report is anonymous. */
    table.text('reporter_id').references('people.id').onDelete('SET NULL')
    table.text('kind').notNullable()
    table.text('what').notNullable()
    table.text('happened_at').notNullable()
    table.text('happened_on').notNullable()
    table.text('file_ids').notNullable()
    table.text('reported_at').notNullable()
    table.text('answer')
    table.text('answered_by').references('people.id').onDelete('SET NULL')
    table.text('answered_at')
    table.index(['site_id', 'happened_on'])
    table.index(['happened_on'])
  })
}

export async function down(knex: Knex): Promise<void> {
  await knex.schema.dropTable('near_misses')
}
