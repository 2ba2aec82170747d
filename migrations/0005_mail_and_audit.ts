import type { Knex } from 'knex'

/** The mail queue and the audit trail with its hash chain. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('mail', (table) => {
    table.text('id').primary()
    table.text('key').notNullable().unique()
    table.text('recipient').notNullable()
    table.text('person_id').references('people.id').onDelete('SET NULL')
    table.text('subject').notNullable()
    table.text('body').notNullable()
    table.text('state').notNullable().defaultTo('queued').checkIn(['queued', 'sent', 'failed'])
    table.integer('tries').notNullable().defaultTo(0)
    table.text('next_try_at').notNullable()
    table.text('last_error')
    table.text('created_at').notNullable()
    table.text('sent_at')
    table.index(['state', 'next_try_at'])
  })

  // Which warning (60, 30, 7 days, day after expiry) a credential already had: nothing is repeated after downtime.
  await knex.schema.createTable('reminder_marks', (table) => {
    table.text('credential_id').notNullable().references('credentials.id').onDelete('CASCADE')
    table.text('step').notNullable().checkIn(['d60', 'd30', 'd7', 'after'])
    table.text('expires_on').notNullable()
    table.text('reminded_on').notNullable()
    table.primary(['credential_id', 'step', 'expires_on'])
  })

  await knex.schema.createTable('audit', (table) => {
    table.integer('seq').primary()
    table.text('at').notNullable()
    table.text('actor_id').references('people.id').onDelete('RESTRICT')
    table.text('action').notNullable()
    table.text('subject_kind').notNullable()
    table.text('subject_id').notNullable()
    table.text('details_digest').notNullable()
    table.text('previous_hash').notNullable()
    table.text('hash').notNullable().unique()
    table.index(['subject_kind', 'subject_id'])
    table.index(['actor_id'])
    table.index(['action'])
  })
  await knex.schema.createTable('audit_details', (table) => {
    table.integer('seq').primary().references('audit.seq').onDelete('RESTRICT')
    table.text('details').notNullable()
  })
  for (const verb of ['update', 'delete']) {
    await knex.raw(`create trigger audit_no_${verb} before ${verb} on audit begin select raise(abort, 'audit is append-only'); end`)
  }
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['audit_details', 'audit', 'reminder_marks', 'mail']) {
    await knex.schema.dropTable(table)
  }
}
