import type { TrainingHours } from '#shared/domain/training-hours'
import type { Db } from './database'

export interface Company {
  name: string
  timeZone: string
  language: 'en' | 'es'
  markAsked: 'tap' | 'signature'
  isDemo: boolean
  /** When required training is open; null: always. */
  trainingHours: TrainingHours | null
  /** Reminders go as text messages too, to who has a phone number. */
  textReminders: boolean
}

/** The company of this database; before set-up an unnamed one in UTC, so that public pages can still answer. */
export async function getCompany(db: Db): Promise<Company> {
  const row = await db('company').first()
  if (!row) return { name: '', timeZone: 'UTC', language: 'en', markAsked: 'tap', isDemo: false, trainingHours: null, textReminders: false }
  return { name: row.name, timeZone: row.timeZone, language: row.language, markAsked: row.markAsked, isDemo: row.isDemo === 1, trainingHours: row.trainingHours ? JSON.parse(row.trainingHours) as TrainingHours : null, textReminders: row.textReminders === 1 }
}

/** Writes the company's one row. Throws when there is one already. */
export async function insertCompany(db: Db, company: Omit<Company, 'markAsked' | 'trainingHours' | 'textReminders'> & { markAsked?: Company['markAsked'] }, now: string): Promise<void> {
  await db('company').insert({ id: 1, ...company, createdAt: now })
}

/** Changes the company's settings. */
export async function updateCompany(db: Db, { trainingHours, ...changes }: Partial<Omit<Company, 'isDemo'>>): Promise<void> {
  await db('company').where({ id: 1 }).update({ ...changes, ...(trainingHours !== undefined && { trainingHours: trainingHours && JSON.stringify(trainingHours) }) })
}
