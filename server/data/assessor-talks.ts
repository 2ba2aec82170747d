import type { Db } from './database'

/** Five minutes with an assessor. */
export interface AssessorTalk { id: string, personId: string, assessorId: string, module: string, note: string | null, talkedAt: string }

/** Records a talk. */
export async function insertAssessorTalk(db: Db, talk: AssessorTalk): Promise<void> {
  await db('assessorTalks').insert(talk)
}

/** When a person last talked with an assessor about a module, or null. */
export async function findLastAssessorTalk(db: Db, personId: string, module: string): Promise<string | null> {
  const row = await db('assessorTalks').where({ personId, module }).orderBy('talkedAt', 'desc').first('talkedAt')
  return row?.talkedAt ?? null
}
