import type { Language } from '#shared/domain/states'
import type { Db } from './database'

/** When a person last read a lesson. */
export interface LessonRead {
  module: string
  lesson: string
  lastReadAt: string
}

/** Every lesson that a person read. */
export async function listLessonReads(db: Db, personId: string): Promise<LessonRead[]> {
  return db('lessonReads').where({ personId }).select('module', 'lesson', 'lastReadAt')
}

/** Records that a lesson was read now; the first time stays. */
export async function recordLessonRead(db: Db, read: { personId: string, module: string, lesson: string, language: Language, now: string }): Promise<void> {
  const { now, ...rest } = read
  await db('lessonReads').insert({ ...rest, firstReadAt: now, lastReadAt: now })
    .onConflict(['personId', 'module', 'lesson']).merge(['lastReadAt', 'language'])
}
