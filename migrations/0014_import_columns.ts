import type { Knex } from 'knex'

/** What somebody said a column of an import means, by its header in plain letters; an empty field means "not used". */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('import_columns', (table) => {
    table.text('kind').notNullable().checkIn(['people', 'credentials'])
    table.text('header').notNullable()
    table.text('field').notNullable()
    table.text('chosen_at').notNullable()
    table.primary(['kind', 'header'])
  })
}

export async function down(knex: Knex): Promise<void> {
  await knex.schema.dropTable('import_columns')
}
