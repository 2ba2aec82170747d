import type { Knex } from 'knex'

/** People, their way in, and where they work. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('company', (table) => {
    table.integer('id').primary().checkIn(['1'])
    table.text('name').notNullable()
    table.text('time_zone').notNullable()
    table.text('language').notNullable().defaultTo('en').checkIn(['en', 'es'])
    table.text('mark_asked').notNullable().defaultTo('tap').checkIn(['tap', 'signature'])
    table.boolean('is_demo').notNullable().defaultTo(false)
    table.text('created_at').notNullable()
  })

  await knex.schema.createTable('crews', (table) => {
    table.text('id').primary()
    table.text('name').notNullable().unique()
    table.text('foreman_id').references('people.id').onDelete('SET NULL')
    table.text('created_at').notNullable()
  })

  await knex.schema.createTable('people', (table) => {
    table.text('id').primary()
    table.text('name').notNullable()
    table.text('sort_name').notNullable()
    table.text('badge').notNullable().unique()
    table.text('email').unique()
    table.text('phone')
    table.text('role').notNullable().defaultTo('worker').checkIn(['worker', 'foreman', 'superintendent', 'safety', 'admin'])
    table.text('language').notNullable().defaultTo('en').checkIn(['en', 'es'])
    table.boolean('reads_well')
    table.text('employer').notNullable()
    table.text('employer_kind').notNullable().defaultTo('own').checkIn(['own', 'temp', 'sub', 'visitor'])
    table.text('trade')
    table.text('hired_on').notNullable()
    table.text('left_on')
    table.text('crew_id').references('crews.id').onDelete('SET NULL')
    table.text('under18_until')
    table.integer('version').notNullable().defaultTo(1)
    table.text('created_at').notNullable()
    table.text('updated_at').notNullable()
    table.index(['sort_name'])
    table.index(['crew_id'])
    table.index(['role'])
  })

  await knex.schema.createTable('sign_in_secrets', (table) => {
    table.text('person_id').primary().references('people.id').onDelete('CASCADE')
    table.text('password_hash')
    table.text('pin_hash')
    table.text('first_used_at')
    table.text('set_at').notNullable()
  })

  await knex.schema.createTable('sign_in_waits', (table) => {
    table.text('key').primary()
    table.integer('wrong').notNullable().defaultTo(0)
    table.text('wait_until')
    table.text('updated_at').notNullable()
  })

  // Lucia's columns (id, user_id, expires_at) keep Lucia's names; ids are stored hashed.
  await knex.schema.createTable('sessions', (table) => {
    table.text('id').primary()
    table.text('user_id').notNullable().references('people.id').onDelete('CASCADE')
    table.integer('expires_at').notNullable()
    table.text('via').notNullable().checkIn(['password', 'badge'])
    table.integer('created_at').notNullable()
    table.index(['user_id'])
    table.index(['expires_at'])
  })

  await knex.schema.createTable('links', (table) => {
    table.text('token_hash').primary()
    table.text('kind').notNullable().checkIn(['join', 'passwordReset', 'calendar'])
    table.text('person_id').notNullable().references('people.id').onDelete('CASCADE')
    table.text('filters')
    table.text('created_by').references('people.id').onDelete('SET NULL')
    table.text('created_at').notNullable()
    table.text('expires_at')
    table.text('used_at')
    table.index(['person_id', 'kind'])
  })

  await knex.schema.createTable('sites', (table) => {
    table.text('id').primary()
    table.text('code').notNullable().unique()
    table.text('name').notNullable()
    table.text('time_zone').notNullable()
    table.text('address')
    table.text('superintendent_id').references('people.id').onDelete('SET NULL')
    table.integer('position').notNullable().defaultTo(0)
    table.text('created_at').notNullable()
    table.index(['superintendent_id'])
  })

  await knex.schema.createTable('assignments', (table) => {
    table.text('id').primary()
    table.text('person_id').references('people.id').onDelete('CASCADE')
    table.text('crew_id').references('crews.id').onDelete('CASCADE')
    table.text('site_id').notNullable().references('sites.id').onDelete('CASCADE')
    table.text('starts_on').notNullable()
    table.text('ends_on')
    table.text('created_at').notNullable()
    table.index(['site_id', 'starts_on'])
    table.index(['person_id'])
    table.index(['crew_id'])
    table.check('(?? is null) <> (?? is null)', ['person_id', 'crew_id'], 'assignments_one_who')
    table.check('?? is null or ?? >= ??', ['ends_on', 'ends_on', 'starts_on'], 'assignments_dates')
  })
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['assignments', 'sites', 'links', 'sessions', 'sign_in_waits', 'sign_in_secrets', 'people', 'crews', 'company']) {
    await knex.schema.dropTable(table)
  }
}
