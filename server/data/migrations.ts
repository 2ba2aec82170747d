import type { Knex } from 'knex'
import * as peopleAndSites from '../../migrations/0001_people_and_sites'
import * as dutiesAndCredentials from '../../migrations/0002_duties_and_credentials'
import * as learning from '../../migrations/0003_learning'
import * as briefings from '../../migrations/0004_briefings'
import * as mailAndAudit from '../../migrations/0005_mail_and_audit'
import * as struckItems from '../../migrations/0006_struck_items'
import * as teaching from '../../migrations/0008_teaching'
import * as companyTexts from '../../migrations/0009_company_texts'
import * as nearMisses from '../../migrations/0010_near_misses'
import * as allowancesAndRetraining from '../../migrations/0011_allowances_and_retraining'
import * as packets from '../../migrations/0012_packets'
import * as renewalsAndTexts from '../../migrations/0013_renewals_and_texts'
import * as importColumns from '../../migrations/0014_import_columns'
import * as mergedPeople from '../../migrations/0015_merged_people'

/** Every migration, by the file name that the Knex command line records; a unit test keeps this equal to the folder. */
export const migrations: Record<string, Knex.Migration> = {
  '0001_people_and_sites.ts': peopleAndSites,
  '0002_duties_and_credentials.ts': dutiesAndCredentials,
  '0003_learning.ts': learning,
  '0004_briefings.ts': briefings,
  '0005_mail_and_audit.ts': mailAndAudit,
  '0006_struck_items.ts': struckItems,
  '0008_teaching.ts': teaching,
  '0009_company_texts.ts': companyTexts,
  '0010_near_misses.ts': nearMisses,
  '0011_allowances_and_retraining.ts': allowancesAndRetraining,
  '0012_packets.ts': packets,
  '0013_renewals_and_texts.ts': renewalsAndTexts,
  '0014_import_columns.ts': importColumns,
  '0015_merged_people.ts': mergedPeople,
}

/** Knex reads migrations from here, because a built server has no migrations folder. */
export const migrationSource: Knex.MigrationSource<string> = {
  getMigrations: async () => Object.keys(migrations),
  getMigrationName: name => name,
  getMigration: async (name) => {
    const migration = migrations[name]
    if (!migration) throw new Error(`No migration is called ${name}`)
    return migration
  },
}
