import type { Knex } from 'knex'
import type { Language } from '#shared/domain/states'
import type { Db } from './database'

export const reminderSteps = ['d60', 'd30', 'd7', 'after'] as const
export type ReminderStep = (typeof reminderSteps)[number]

/** Somebody to write to about a credential. */
export interface Addressee { personId: string, name: string, email: string | null, phone: string | null, language: Language }

/** The warnings that these credentials already had, as `id/step/expiry`. */
export async function listReminderMarks(db: Db, credentialIds: string[]): Promise<Set<string>> {
  const marks = new Set<string>()
  for (let start = 0; start < credentialIds.length; start += 500) {
    const rows = await db('reminderMarks').whereIn('credentialId', credentialIds.slice(start, start + 500)).select('credentialId', 'step', 'expiresOn')
    for (const row of rows) marks.add(`${row.credentialId}/${row.step}/${row.expiresOn}`)
  }
  return marks
}

/** True when this day's digests were queued already. */
export async function wasRemindedOn(db: Db, date: string): Promise<boolean> {
  return (await db('reminderMarks').where({ remindedOn: date }).first('step')) !== undefined
}

/** Notes which credentials had which warning. */
export async function insertReminderMarks(db: Db, marks: readonly { credentialId: string, step: ReminderStep, expiresOn: string, remindedOn: string }[]): Promise<void> {
  for (let start = 0; start < marks.length; start += 500) await db('reminderMarks').insert(marks.slice(start, start + 500)).onConflict(['credentialId', 'step', 'expiresOn']).ignore()
}

const columns = ['people.id as personId', 'people.name', 'people.email', 'people.phone', 'people.language']
const employed = (today: string) => (query: Knex.QueryBuilder) => query.where('people.hiredOn', '<=', today).where(left => left.whereNull('people.leftOn').orWhere('people.leftOn', '>=', today))

/** Each holder with their foreman, who may be missing. */
export async function listHoldersWithForeman(db: Db, personIds: string[], today: string): Promise<Map<string, { holder: Addressee, foreman: Addressee | null }>> {
  const answer = new Map<string, { holder: Addressee, foreman: Addressee | null }>()
  for (let start = 0; start < personIds.length; start += 500) {
    const rows = await db('people').leftJoin('crews', 'crews.id', 'people.crewId').leftJoin('people as f', 'f.id', 'crews.foremanId')
      .whereIn('people.id', personIds.slice(start, start + 500)).select(...columns, 'f.id as fId', 'f.name as fName', 'f.email as fEmail', 'f.phone as fPhone', 'f.language as fLanguage', 'f.leftOn as fLeftOn')
    for (const row of rows) {
      const { personId, name, email, phone, language } = row
      const hasForeman = row.fId !== null && row.fId !== personId && (row.fLeftOn === null || row.fLeftOn >= today)
      answer.set(personId, { holder: { personId, name, email, phone, language }, foreman: hasForeman ? { personId: row.fId, name: row.fName, email: row.fEmail, phone: row.fPhone, language: row.fLanguage } : null })
    }
  }
  return answer
}

/** The safety managers now employed. */
export async function listSafetyManagers(db: Db, today: string): Promise<Addressee[]> {
  return db('people').where({ role: 'safety' }).modify(employed(today)).select(...columns)
}
