import type { Knex } from 'knex'

/** One-shift allowances, what each kind of near miss asks to be learnt again, and who was asked to. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('allowances', (table) => {
    table.text('id').primary()
    table.text('credential_id').notNullable().references('credentials.id').onDelete('RESTRICT')
    table.text('site_id').notNullable().references('sites.id').onDelete('RESTRICT')
    table.text('date').notNullable()
    table.text('allowed_by').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('created_at').notNullable()
    table.unique(['credential_id', 'site_id', 'date'])
    table.index(['site_id', 'date'])
  })
  await knex.schema.createTable('retraining_rules', (table) => {
    table.text('kind').primary()
    /** Slugs of modules, as a JSON list. */
    table.text('modules').notNullable()
    table.text('changed_by').references('people.id').onDelete('SET NULL')
    table.text('changed_at').notNullable()
  })
  await knex.schema.createTable('retrainings', (table) => {
    table.text('id').primary()
    table.text('near_miss_id').notNullable().references('near_misses.id').onDelete('RESTRICT')
    table.text('person_id').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('module').notNullable()
    /** The credential that was ended with it, if one was. */
    table.text('credential_id').references('credentials.id').onDelete('RESTRICT')
    table.text('decided_by').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('decided_at').notNullable()
    table.unique(['near_miss_id', 'person_id', 'module'])
  })
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['retrainings', 'retraining_rules', 'allowances']) await knex.schema.dropTable(table)
}
