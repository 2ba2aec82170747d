import { dateInZone } from '#shared/domain/dates'
import type { Db } from '../data/database'
import { getCompany } from '../data/company'

/** The calendar date of `now` in the company's time zone. */
export async function todayOfCompany(db: Db, now: string): Promise<string> {
  return dateInZone(now, (await getCompany(db)).timeZone)
}
