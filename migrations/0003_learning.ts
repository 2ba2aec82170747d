import type { Knex } from 'knex'

/** What people read, tried and were signed off on. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('lesson_reads', (table) => {
    table.text('person_id').notNullable().references('people.id').onDelete('CASCADE')
    table.text('module').notNullable()
    table.text('lesson').notNullable()
    table.text('language').notNullable().checkIn(['en', 'es'])
    table.text('first_read_at').notNullable()
    table.text('last_read_at').notNullable()
    table.primary(['person_id', 'module', 'lesson'])
  })

  await knex.schema.createTable('attempts', (table) => {
    table.text('id').primary()
    table.text('person_id').notNullable().references('people.id').onDelete('CASCADE')
    table.text('module').notNullable()
    table.text('language').notNullable().checkIn(['en', 'es'])
    table.text('seed').notNullable()
    table.text('served').notNullable()
    table.text('started_at').notNullable()
    table.text('ends_at').notNullable()
    table.text('submitted_at')
    table.text('answers')
    table.text('result')
    table.float('score')
    table.boolean('passed')
    table.index(['person_id', 'module', 'started_at'])
    table.index(['module', 'submitted_at'])
    table.check('(?? is null) = (?? is null)', ['submitted_at', 'passed'], 'attempts_graded_once')
  })

  await knex.schema.createTable('sign_off_requests', (table) => {
    table.text('id').primary()
    table.text('person_id').notNullable().references('people.id').onDelete('CASCADE')
    table.text('module').notNullable()
    table.text('requested_at').notNullable()
    table.text('closed_at')
    table.index(['module', 'closed_at'])
  })
  await knex.raw('create unique index sign_off_requests_open on sign_off_requests (person_id, module) where closed_at is null')

  await knex.schema.createTable('sign_offs', (table) => {
    table.text('id').primary()
    table.text('person_id').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('assessor_id').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('module').notNullable()
    table.text('steps').notNullable()
    table.text('mark').notNullable()
    table.boolean('passed').notNullable()
    table.text('signed_at').notNullable()
    table.index(['person_id', 'module'])
    table.index(['assessor_id'])
    table.check('?? <> ??', ['person_id', 'assessor_id'], 'sign_offs_not_self')
  })
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['sign_offs', 'sign_off_requests', 'attempts', 'lesson_reads']) {
    await knex.schema.dropTable(table)
  }
}
