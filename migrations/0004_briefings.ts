import type { Knex } from 'knex'

const appendOnly = (table: string) => ['update', 'delete'].map(verb => `
  create trigger ${table}_no_${verb} before ${verb} on ${table}
  begin select raise(abort, '${table} is append-only'); end`)

/** Morning briefings, who signed in, and the sealed sheets. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('briefings', (table) => {
    table.text('id').primary()
    table.text('site_id').notNullable().references('sites.id').onDelete('RESTRICT')
    table.text('local_date').notNullable()
    table.text('run_by').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('talk').notNullable()
    table.text('talk_versions').notNullable()
    table.text('work').notNullable()
    table.text('weather')
    table.text('notes')
    table.binary('secret').notNullable()
    table.text('opened_at').notNullable()
    table.text('closed_at')
    table.text('sealed_at')
    table.boolean('without_signal').notNullable().defaultTo(false)
    table.text('created_at').notNullable()
    table.index(['site_id', 'local_date'])
    table.index(['talk'])
    table.index(['sealed_at'])
    table.check('?? is null or ?? is not null', ['sealed_at', 'closed_at'], 'briefings_closed_before_sealed')
  })

  await knex.schema.createTable('admissions', (table) => {
    table.text('token_hash').primary()
    table.text('briefing_id').notNullable().references('briefings.id').onDelete('CASCADE')
    table.text('browser_hash').notNullable()
    table.integer('step').notNullable()
    table.text('sign_in_id')
    table.text('created_at').notNullable()
    table.index(['briefing_id'])
  })

  await knex.schema.createTable('presence_tries', (table) => {
    table.text('briefing_id').notNullable().references('briefings.id').onDelete('CASCADE')
    table.text('browser_hash').notNullable()
    table.integer('wrong').notNullable().defaultTo(0)
    table.text('wait_until')
    table.text('updated_at').notNullable()
    table.primary(['briefing_id', 'browser_hash'])
  })

  await knex.schema.createTable('sign_ins', (table) => {
    table.text('id').primary()
    table.text('briefing_id').notNullable().references('briefings.id').onDelete('RESTRICT')
    table.text('key').notNullable().unique()
    table.text('person_id').references('people.id').onDelete('RESTRICT')
    table.text('visitor_name')
    table.text('visitor_company')
    table.text('visitor_host')
    table.text('method').notNullable().checkIn(['ownPhone', 'foremanDevice', 'addedByForeman', 'paper', 'siteTablet', 'makeUp'])
    table.text('reason').checkIn(['noPhone', 'deadPhone', 'noSignal', 'late', 'cannotRead'])
    table.text('mark').notNullable()
    table.text('language').notNullable().checkIn(['en', 'es'])
    table.text('signed_at').notNullable()
    table.boolean('late').notNullable().defaultTo(false)
    table.text('entered_by').references('people.id').onDelete('SET NULL')
    table.text('answer')
    table.text('explained_by').references('people.id').onDelete('SET NULL')
    table.boolean('without_signal').notNullable().defaultTo(false)
    table.integer('presence_step')
    table.text('removed_at')
    table.text('removed_by').references('people.id').onDelete('SET NULL')
    table.text('created_at').notNullable()
    table.index(['briefing_id', 'signed_at'])
    table.index(['person_id', 'signed_at'])
    table.check('(?? is null) <> (?? is null)', ['person_id', 'visitor_name'], 'sign_ins_one_who')
  })
  await knex.raw('create unique index sign_ins_once on sign_ins (briefing_id, person_id) where person_id is not null and removed_at is null')

  await knex.schema.createTable('sheets', (table) => {
    table.text('hash').primary()
    table.text('previous_hash')
    table.text('site_id').notNullable().references('sites.id').onDelete('RESTRICT')
    table.integer('number').notNullable()
    table.text('briefing_id').references('briefings.id').onDelete('RESTRICT')
    table.text('kind').notNullable().checkIn(['sheet', 'addendum'])
    table.text('body').notNullable()
    table.text('signature')
    table.text('key_id')
    table.text('sealed_by').references('people.id').onDelete('RESTRICT')
    table.text('sealed_at').notNullable()
    table.unique(['site_id', 'number'])
    table.unique(['site_id', 'previous_hash'])
    table.index(['briefing_id'])
  })
  await knex.raw('create unique index sheets_one_per_briefing on sheets (briefing_id) where kind = \'sheet\'')
  await knex.raw('create unique index sheets_one_first on sheets (site_id) where previous_hash is null')
  for (const trigger of appendOnly('sheets')) await knex.raw(trigger)
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['sheets', 'sign_ins', 'presence_tries', 'admissions', 'briefings']) {
    await knex.schema.dropTable(table)
  }
}
