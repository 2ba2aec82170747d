import type { Knex } from 'knex'
import { addDays, dateInZone, dayOfWeek } from '../../shared/domain/dates'
import type { QuizBank } from '../../shared/domain/quiz-bank'
import { insertCompany } from '../../server/data/company'
import type { Settings } from '../../server/services/settings'
import { companyZone, type DemoContext, instantAt, writeAudit } from './context'
import { seedBriefings } from './briefings'
import { seedCredentials } from './credentials'
import { seedDesignations } from './designations'
import { hashDemoSecrets, seedPeople, seedSignIns } from './people'
import { seedPourDays } from './pour-days'
import { seedRules } from './rules'
import { mondayOfWeek, seedSitesAndCrews } from './sites-and-crews'

function contextFor(knex: Knex, settings: Settings): DemoContext {
  const now = settings.clock.now()
  const today = dateInZone(now, companyZone)
  return { knex, settings, now, today, monday: addDays(today, 1 - dayOfWeek(today)), audit: [] }
}

/**
 * Fills an empty database with "Cedar Hollow Walls": the same people and the same story at every seeding, with
 * dates around the company's today. Past quizzes are drawn from `banks`. Does nothing when there are people already. Needs the reference data.
 */
export async function seedDemoCompany(knex: Knex, settings: Settings, banks: readonly QuizBank[]): Promise<void> {
  if (await knex('people').first('id')) return
  const hashes = await hashDemoSecrets()
  await knex.transaction(async (trx) => {
    const context = contextFor(trx, settings)
    const company = { name: 'Cedar Hollow Walls', timeZone: companyZone, language: 'en', isDemo: true } as const
    await insertCompany(trx, company, instantAt(mondayOfWeek(context, -105), 8, 0))
    await seedPeople(context)
    await seedSignIns(context, hashes)
    await seedSitesAndCrews(context)
    await seedRules(context)
    await seedDesignations(context)
    await seedCredentials(context, banks)
    await seedPourDays(context)
    await seedBriefings(context)
    await writeAudit(context)
  })
}
