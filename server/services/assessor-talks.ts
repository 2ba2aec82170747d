import { randomUUID } from 'node:crypto'
import { moduleBySlug } from '#shared/domain/curriculum'
import { addDays, startOfDay } from '#shared/domain/dates'
import type { Language } from '#shared/domain/states'
import type { PausedQuizList, ReadableList } from '#shared/schemas/training'
import { insertAssessorTalk } from '../data/assessor-talks'
import { listFailedTwice } from '../data/attempts'
import { appendAudit } from '../data/audit'
import { listEmployedLearners } from '../data/assessors'
import { assessedModules, isReached, requireAssessable } from './assessing'
import { progressOf } from './learning-progress'
import { openingOf } from './quiz'
import { Refusal } from './refusal'
import type { Teaching } from './teaching'
import { countAssessorTalk } from './training-minutes'
import type { Work } from './work'

/** How far back a paused quiz is still offered to assessors, in days. */
const pausedWithinDays = 60

async function pausedQuiz(work: Work, teaching: Teaching, { personId, module }: { personId: string, module: string }) {
  const taught = teaching.get(module)
  if (!taught) return null
  const { reads } = await progressOf(work.db, work, teaching, personId)
  const opening = await openingOf(work.db, { personId, module: taught, reads, now: work.now })
  return opening.isOpen ? null : { opening, taught }
}

/** The quizzes that are paused for people whom the actor may assess: five minutes with them opens the quiz at once. */
export async function listPausedQuizzes(work: Work, teaching: Teaching, language: Language): Promise<PausedQuizList> {
  const assessed = await assessedModules(work.db, work, teaching)
  const items = []
  const since = startOfDay(addDays(work.today, -pausedWithinDays), work.company.timeZone)
  for (const { personId, person, module } of await listFailedTwice(work.db, { modules: [...assessed.keys()], since })) {
    if (personId === work.actor.personId || !await isReached(work.db, assessed.get(module), personId, work.today)) continue
    const paused = await pausedQuiz(work, teaching, { personId, module })
    if (!paused) continue
    const missed = paused.taught.lessons.filter(lesson => paused.opening.lessonsToRead.includes(lesson.slug)).map(lesson => lesson.title[language])
    items.push({ personId, person, module, title: moduleBySlug(module)?.title[language] ?? module, opensAt: paused.opening.opensAt, missed })
  }
  return { items }
}

/**
 * Records that an assessor went through the missed questions with somebody for five minutes: the paused quiz opens
 * at once. 404, 403 and 422 as for a sign-off; 409 `notPaused` when the quiz is open anyway.
 */
export async function recordAssessorTalk(work: Work, teaching: Teaching, { personId, module, note }: { personId: string, module: string, note?: string }) {
  const { db, actor, now } = work
  await requireAssessable(db, work, teaching, { personId, module })
  return db.transaction(async (trx) => {
    if (!await pausedQuiz({ ...work, db: trx }, teaching, { personId, module })) throw new Refusal('conflict', 'notPaused', { message: 'This quiz is open' })
    const talk = { id: randomUUID(), personId, assessorId: actor.personId, module, note: note ?? null, talkedAt: now }
    await insertAssessorTalk(trx, talk)
    await countAssessorTalk(trx, work, { personId, module })
    await appendAudit(trx, { at: now, actorId: actor.personId, action: 'assessorTalk.recorded', subject: { kind: 'person', id: personId }, after: { module } })
    return { id: talk.id, personId, module, talkedAt: now }
  })
}

/** To whom the actor may read a quiz aloud, and of which modules. */
export async function listReadable(work: Work, teaching: Teaching, language: Language): Promise<ReadableList> {
  const assessed = await assessedModules(work.db, work, teaching)
  const people = []
  for (const person of await listEmployedLearners(work.db, work.today)) {
    if (person.id === work.actor.personId) continue
    for (const sites of new Set(assessed.values())) {
      if (!await isReached(work.db, sites, person.id, work.today)) continue
      people.push(person)
      break
    }
  }
  return { people, modules: [...assessed.keys()].map(slug => ({ slug, title: moduleBySlug(slug)?.title[language] ?? slug })) }
}
