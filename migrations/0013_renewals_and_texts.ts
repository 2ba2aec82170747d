import type { Knex } from 'knex'

/** Booked renewal sessions with their seats; a calendar entry on a message; text messages beside mail. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('renewal_rounds', (table) => {
    table.text('id').primary()
    table.text('type_id').notNullable().references('credential_types.id').onDelete('RESTRICT')
    table.text('site_id').notNullable().references('sites.id').onDelete('RESTRICT')
    table.text('place').notNullable()
    table.text('trainer').notNullable()
    table.text('starts_at').notNullable()
    table.integer('minutes').notNullable()
    table.integer('seats').notNullable()
    table.text('state').notNullable().defaultTo('planned').checkIn(['planned', 'held', 'cancelled'])
    table.text('note')
    table.integer('version').notNullable().defaultTo(1)
    table.text('created_by').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('created_at').notNullable()
    table.index(['state', 'starts_at'])
  })
  await knex.schema.createTable('renewal_seats', (table) => {
    table.text('round_id').notNullable().references('renewal_rounds.id').onDelete('CASCADE')
    table.text('person_id').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('state').notNullable().checkIn(['invited', 'waiting', 'present', 'absent'])
    table.text('added_at').notNullable()
    /** The new credential that came of it. */
    table.text('credential_id').references('credentials.id').onDelete('RESTRICT')
    table.primary(['round_id', 'person_id'])
    table.index(['person_id'])
  })
  await knex.raw('alter table mail add column channel text not null default \'mail\'')
  await knex.raw('alter table mail add column calendar text')
  await knex.raw('alter table company add column text_reminders integer not null default 0')
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('alter table company drop column text_reminders')
  await knex.raw('alter table mail drop column calendar')
  await knex.raw('alter table mail drop column channel')
  for (const table of ['renewal_seats', 'renewal_rounds']) await knex.schema.dropTable(table)
}
