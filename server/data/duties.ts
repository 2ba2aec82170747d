import type { DutyView } from '#shared/schemas/requirements'
import type { Db } from './database'

/** Every duty in the order of the wall. */
export async function listDuties(db: Db): Promise<DutyView[]> {
  const rows = await db('duties').orderBy(['position', 'code']).select('id', 'code', 'nameEn', 'nameEs', 'learningBeside', 'sameDayFix', 'recencyMonths')
  return rows.map(({ nameEn, nameEs, learningBeside, sameDayFix, ...row }) => ({ ...row, name: { en: nameEn, es: nameEs }, learningBeside: learningBeside === 1, sameDayFix: sameDayFix === 1 }))
}

function toRow(duty: Partial<DutyView>) {
  const { name, ...rest } = duty
  return { ...rest, ...(name && { nameEn: name.en, nameEs: name.es }) }
}

/** Adds a duty at the end. */
export async function insertDuty(db: Db, duty: DutyView, now: string): Promise<void> {
  const last = await db('duties').max('position as position').first()
  await db('duties').insert({ ...toRow(duty), position: (last?.position ?? -1) + 1, createdAt: now })
}

/** Changes a duty. */
export async function updateDuty(db: Db, id: string, changes: Partial<DutyView>): Promise<void> {
  if (Object.keys(changes).length > 0) await db('duties').where({ id }).update(toRow(changes))
}
