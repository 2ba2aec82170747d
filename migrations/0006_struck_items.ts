import type { Knex } from 'knex'

/** Quiz items taken out of the draw, with who, when and why; a restored one keeps its row. */
export async function up(knex: Knex): Promise<void> {
  await knex.schema.createTable('struck_items', (table) => {
    table.text('id').primary()
    table.text('item_id').notNullable()
    table.text('module').notNullable()
    table.text('reason').notNullable()
    table.text('struck_by').notNullable().references('people.id').onDelete('RESTRICT')
    table.text('struck_at').notNullable()
    table.text('restore_reason')
    table.text('restored_by').references('people.id').onDelete('RESTRICT')
    table.text('restored_at')
    table.index(['item_id', 'struck_at'])
    table.index(['module', 'restored_at'])
    table.check('(?? is null) = (?? is null)', ['restored_at', 'restored_by'], 'struck_items_restored_whole')
  })
  await knex.raw('create unique index struck_items_once on struck_items (item_id) where restored_at is null')
}

export async function down(knex: Knex): Promise<void> {
  await knex.schema.dropTable('struck_items')
}
