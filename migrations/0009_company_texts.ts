import type { Knex } from 'knex'

/** Talks of the company's own and its notes on modules; every save is a version of its own and stays. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('company_texts', (table) => {
    table.text('id').primary()
    table.text('kind').notNullable().checkIn(['talk', 'moduleNote'])
    table.text('slug').notNullable()
    table.integer('version').notNullable()
    table.text('data').notNullable()
    table.boolean('is_retired').notNullable().defaultTo(false)
    table.text('saved_by').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('saved_at').notNullable()
    table.unique(['kind', 'slug', 'version'])
  })
}

export async function down(knex: Knex): Promise<void> {
  await knex.schema.dropTable('company_texts')
}
