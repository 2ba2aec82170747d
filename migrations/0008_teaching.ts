import type { Knex } from 'knex'

/** Read-aloud quizzes, talks with an assessor, questions to a trainer, and the minutes of required training. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.alterTable('attempts', (table) => {
    table.text('read_by').references('people.id').onDelete('SET NULL')
    table.text('languages')
  })
  await knex.schema.alterTable('company', (table) => {
    table.text('training_hours')
  })

  await knex.schema.createTable('assessor_talks', (table) => {
    table.text('id').primary()
    table.text('person_id').notNullable().references('people.id').onDelete('CASCADE')
    table.text('assessor_id').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('module').notNullable()
    table.text('note')
    table.text('talked_at').notNullable()
    table.index(['person_id', 'module', 'talked_at'])
    table.check('?? <> ??', ['person_id', 'assessor_id'], 'assessor_talks_not_self')
  })

  await knex.schema.createTable('trainer_questions', (table) => {
    table.text('id').primary()
    table.text('person_id').notNullable().references('people.id').onDelete('CASCADE')
    table.text('trainer_id').notNullable().references('people.id').onDelete('CASCADE')
    table.text('module').notNullable()
    table.text('lesson')
    table.text('item_id')
    table.text('language').notNullable().checkIn(['en', 'es'])
    table.text('question').notNullable()
    table.text('asked_at').notNullable()
    table.text('answer')
    table.text('answered_by').references('people.id').onDelete('SET NULL')
    table.text('answered_at')
    table.index(['person_id', 'asked_at'])
    table.index(['trainer_id', 'answered_at'])
  })

  await knex.schema.createTable('training_minutes', (table) => {
    table.text('id').primary()
    table.text('person_id').notNullable().references('people.id').onDelete('CASCADE')
    table.text('module').notNullable()
    table.text('kind').notNullable().checkIn(['lesson', 'quiz', 'handsOn', 'assessorTalk'])
    table.text('lesson')
    table.integer('minutes').notNullable()
    table.text('done_on').notNullable()
    table.text('done_at').notNullable()
    table.index(['person_id', 'module', 'done_at'])
    table.index(['done_on'])
    table.check('?? >= 0', ['minutes'], 'training_minutes_not_negative')
  })
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['training_minutes', 'trainer_questions', 'assessor_talks']) await knex.schema.dropTable(table)
  await knex.schema.alterTable('company', table => table.dropColumn('training_hours'))
  await knex.schema.alterTable('attempts', (table) => {
    table.dropColumn('languages')
  })
  await knex.schema.alterTable('attempts', (table) => {
    table.dropForeign('read_by')
    table.dropColumn('read_by')
  })
}
