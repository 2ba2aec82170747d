import { modules } from '#shared/domain/curriculum'
import type { Language } from '#shared/domain/states'
import type { PersonRecordView } from '#shared/schemas/person-record'
import { listSignInsOf } from '../data/views/person-sign-ins'
import { progressOf } from './learning-progress'
import { requirePerson } from './people'
import type { Teaching } from './teaching'
import type { Work } from './work'

/** A person's wall and last sign-ins; scores and answers stay theirs. 404 for somebody out of reach. */
export async function readPersonRecord(work: Work, teaching: Teaching, { personId, language }: { personId: string, language: Language }): Promise<PersonRecordView> {
  const person = await requirePerson(work, personId)
  const { states } = await progressOf(work.db, work, teaching, person.id)
  return {
    wall: modules.map(({ slug, shortTitle, course, left }) => ({ slug, shortTitle: shortTitle[language], course, left, state: states.get(slug) ?? 'unwritten' })),
    signIns: await listSignInsOf(work.db, person.id, 60),
  }
}
