import type { Knex } from 'knex'

/** Duties, what they ask for, and what people hold. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('duties', (table) => {
    table.text('id').primary()
    table.text('code').notNullable().unique()
    table.text('name_en').notNullable()
    table.text('name_es').notNullable()
    table.boolean('learning_beside').notNullable().defaultTo(true)
    table.boolean('same_day_fix').notNullable().defaultTo(true)
    table.integer('recency_months')
    table.integer('position').notNullable().defaultTo(0)
    table.text('created_at').notNullable()
  })

  await knex.schema.createTable('crew_duties', (table) => {
    table.text('crew_id').notNullable().references('crews.id').onDelete('CASCADE')
    table.text('duty_id').notNullable().references('duties.id').onDelete('CASCADE')
    table.integer('count').notNullable().defaultTo(1)
    table.primary(['crew_id', 'duty_id'])
  })

  await knex.schema.createTable('duty_days', (table) => {
    table.text('person_id').notNullable().references('people.id').onDelete('CASCADE')
    table.text('duty_id').notNullable().references('duties.id').onDelete('CASCADE')
    table.text('done_on').notNullable()
    table.text('site_id').references('sites.id').onDelete('SET NULL')
    table.primary(['person_id', 'duty_id', 'done_on'])
  })

  await knex.schema.createTable('credential_types', (table) => {
    table.text('id').primary()
    table.text('code').notNullable().unique()
    table.text('name_en').notNullable()
    table.text('name_es').notNullable()
    table.text('validity_kind').notNullable().checkIn(['never', 'period', 'printed'])
    table.integer('months')
    table.text('anchor').checkIn(['day', 'monthEnd'])
    table.text('basis').notNullable().checkIn(['law', 'issuer', 'site', 'company'])
    table.integer('lead_days').notNullable().defaultTo(60)
    table.boolean('per_site').notNullable().defaultTo(false)
    table.text('source').notNullable()
    table.text('module').unique()
    table.text('created_at').notNullable()
    table.check('(?? = \'period\') = (?? is not null and ?? is not null)', ['validity_kind', 'months', 'anchor'], 'types_period')
    table.check('not (?? = \'law\' and coalesce(??, \'day\') = \'monthEnd\')', ['basis', 'anchor'], 'types_law_not_month_end')
  })

  await knex.schema.createTable('rules', (table) => {
    table.text('id').primary()
    table.text('duty_id').references('duties.id').onDelete('CASCADE')
    table.text('site_id').references('sites.id').onDelete('CASCADE')
    table.text('created_at').notNullable()
    table.index(['duty_id'])
    table.index(['site_id'])
  })

  await knex.schema.createTable('rule_types', (table) => {
    table.text('rule_id').notNullable().references('rules.id').onDelete('CASCADE')
    table.integer('group_number').notNullable()
    table.text('type_id').notNullable().references('credential_types.id').onDelete('RESTRICT')
    table.primary(['rule_id', 'group_number', 'type_id'])
    table.index(['type_id'])
  })

  await knex.schema.createTable('designations', (table) => {
    table.text('id').primary()
    table.text('person_id').notNullable().references('people.id').onDelete('CASCADE')
    table.text('kind').notNullable().checkIn(['competent', 'qualified', 'assessor', 'trainer'])
    table.text('subject').notNullable()
    table.text('site_id').references('sites.id').onDelete('CASCADE')
    table.text('authority').notNullable()
    table.text('starts_on').notNullable()
    table.text('ends_on')
    table.text('created_at').notNullable()
    table.index(['person_id'])
    table.index(['kind', 'subject'])
  })

  await knex.schema.createTable('holds', (table) => {
    table.text('id').primary()
    table.text('person_id').notNullable().references('people.id').onDelete('CASCADE')
    table.text('starts_on').notNullable()
    table.text('ends_on')
    table.text('reason').notNullable()
    table.text('created_by').references('people.id').onDelete('SET NULL')
    table.text('created_at').notNullable()
    table.index(['person_id'])
  })

  await knex.schema.createTable('files', (table) => {
    table.text('id').primary()
    table.text('sha256').notNullable()
    table.text('type').notNullable()
    table.integer('size').notNullable()
    table.text('owner_id').references('people.id').onDelete('SET NULL')
    table.text('created_at').notNullable()
    table.index(['sha256'])
    table.index(['owner_id'])
  })

  await knex.schema.createTable('credentials', (table) => {
    table.text('id').primary()
    table.text('person_id').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('type_id').notNullable().references('credential_types.id').onDelete('RESTRICT')
    table.text('issued_on').notNullable()
    table.text('expires_on')
    table.text('number')
    table.text('issuer')
    table.text('site_id').references('sites.id').onDelete('RESTRICT')
    table.text('details')
    table.text('file_id').references('files.id').onDelete('SET NULL')
    table.text('verification').notNullable().defaultTo('unverified').checkIn(['unverified', 'verified', 'rejected'])
    table.text('verified_by').references('people.id').onDelete('SET NULL')
    table.text('verified_at')
    table.text('verification_note')
    table.text('withdrawn_on')
    table.text('withdrawn_by').references('people.id').onDelete('SET NULL')
    table.text('withdrawal_reason')
    table.text('attempt_id')
    table.text('sign_off_id')
    table.text('card_code').notNullable().unique()
    table.text('created_by').references('people.id').onDelete('SET NULL')
    table.text('created_at').notNullable()
    table.integer('version').notNullable().defaultTo(1)
    table.index(['person_id', 'type_id'])
    table.index(['type_id'])
    table.index(['expires_on'])
    table.index(['site_id'])
    table.check('(?? is null) = (?? is null)', ['withdrawn_on', 'withdrawal_reason'], 'credentials_withdrawal_reason')
  })
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['credentials', 'files', 'holds', 'designations', 'rule_types', 'rules', 'credential_types', 'duty_days', 'crew_duties', 'duties']) {
    await knex.schema.dropTable(table)
  }
}
