import type { Knex } from 'knex'

/** Site packets as they were handed over, and who looked at them when. Only the SHA-256 of a link's word is kept. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('packets', (table) => {
    table.text('id').primary()
    table.text('token_hash').notNullable().unique()
    table.text('site_id').notNullable().references('sites.id').onDelete('RESTRICT')
    table.text('made_by').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('made_at').notNullable()
    table.text('ends_on').notNullable()
    table.text('revoked_at')
    /** The contents in canonical JSON, and its SHA-256. */
    table.text('body').notNullable()
    table.text('hash').notNullable()
    table.index(['site_id', 'made_at'])
  })
  await knex.schema.createTable('packet_views', (table) => {
    table.increments('id')
    table.text('packet_id').notNullable().references('packets.id').onDelete('CASCADE')
    table.text('part').notNullable().checkIn(['page', 'pdf'])
    table.text('viewed_at').notNullable()
    table.index(['packet_id', 'viewed_at'])
  })
}

export async function down(knex: Knex): Promise<void> {
  for (const table of ['packet_views', 'packets']) await knex.schema.dropTable(table)
}
