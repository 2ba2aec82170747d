import { moduleBySlug, modules, type Module } from '#shared/domain/curriculum'
import type { Language } from '#shared/domain/states'
import { credentialStateOn } from '#shared/domain/validity'
import type { LessonView, ModuleLine, ModuleView, WallView } from '#shared/schemas/learning'
import { findRunningAttempt, listGradedAttempts } from '../data/attempts'
import { recordLessonRead } from '../data/lesson-reads'
import { findLastSignOff, findOpenRequest, listUnusedSignOffs } from '../data/sign-offs'
import { shownNote } from './company-texts'
import { progressOf, type Progress } from './learning-progress'
import { openingOf } from './quiz'
import { notFound } from './refusal'
import type { TaughtModule, Teaching } from './teaching'
import { countLesson, requireTrainingHours } from './training-minutes'
import type { Work } from './work'

function toLine(module: Module, taught: TaughtModule | undefined, progress: Progress, language: Language): ModuleLine {
  const lessons = taught?.lessons.map(({ slug, title, minutes }) => ({ slug, title: title[language], minutes, read: progress.reads.has(`${module.slug}/${slug}`) })) ?? []
  return {
    slug: module.slug, title: module.title[language], shortTitle: module.shortTitle[language],
    course: module.course, position: module.position, left: module.left, restsOn: [...module.restsOn],
    minutes: taught ? lessons.reduce((sum, lesson) => sum + lesson.minutes, 0) : null,
    state: progress.states.get(module.slug) ?? 'unwritten', lessons,
  }
}

/** The whole training wall of the person who asks, from the bottom left. */
export async function readWall(work: Work, teaching: Teaching, language: Language): Promise<WallView> {
  const progress = await progressOf(work.db, work, teaching, work.actor.personId)
  return { items: modules.map(module => toLine(module, teaching.get(module.slug), progress, language)), next: progress.next }
}

async function quizOf(work: Work, taught: TaughtModule, progress: Progress): Promise<ModuleView['quiz']> {
  const { db, actor, now } = work
  const opening = await openingOf(db, { personId: actor.personId, module: taught, reads: progress.reads, now })
  const running = await findRunningAttempt(db, actor.personId, taught.slug, now)
  const last = (await listGradedAttempts(db, actor.personId, taught.slug)).at(-1)
  return {
    items: Math.max(taught.bank.quizLength, taught.bank.items.filter(item => item.mustKnow).length), passMark: taught.bank.passMark,
    isOpen: opening.isOpen && progress.states.get(taught.slug) !== 'waiting',
    ...(!opening.isOpen && { opensAt: opening.opensAt, lessonsToRead: opening.lessonsToRead }),
    ...(running && { running: { id: running.id, endsAt: running.endsAt } }),
    ...(last && { last: { id: last.id, passed: last.passed, score: last.result.score, submittedAt: last.submittedAt } }),
  }
}

async function handsOnOf(work: Work, slug: string): Promise<ModuleView['handsOn']> {
  const { db, actor: { personId } } = work
  const last = await findLastSignOff(db, personId, slug)
  const unused = (await listUnusedSignOffs(db, personId, slug)).at(-1)
  return {
    isAsked: await findOpenRequest(db, { personId, module: slug }) !== undefined,
    isPassed: unused?.passed ?? false,
    ...(last && { last: { id: last.id, passed: last.passed, signedAt: last.signedAt, assessor: last.assessor, notMet: last.steps.filter(step => !step.ok).map(({ id, note }) => ({ id, ...(note !== undefined && { note }) })) } }),
  }
}

/** One module with everything that its page needs; 404 for a slug that is no module. */
export async function readModule(work: Work, teaching: Teaching, { slug, language }: { slug: string, language: Language }): Promise<ModuleView> {
  const module = moduleBySlug(slug)
  if (!module) throw notFound('module')
  const taught = teaching.get(slug)
  const progress = await progressOf(work.db, work, teaching, work.actor.personId)
  const held = progress.credentials.find(credential => credential.module === slug)
  const text = taught?.text[language]
  const note = await shownNote(work.db, slug, language)
  return {
    ...toLine(module, taught, progress, language), ...(note && { note }),
    summary: text?.summary ?? '', cautions: text?.cautions ?? [], checklist: text?.checklist ?? [], sources: text?.sources ?? [],
    ...(taught && { quiz: await quizOf(work, taught, progress) }),
    ...(text && text.checklist.length > 0 && { handsOn: await handsOnOf(work, slug) }),
    ...(held && { credential: { id: held.id, code: held.cardCode, state: credentialStateOn(held, held, work.today), issuedOn: held.issuedOn, expiresOn: held.expiresOn } }),
  }
}

function requireLesson(teaching: Teaching, slug: string, lesson: string) {
  const module = moduleBySlug(slug)
  const taught = teaching.get(slug)
  const index = taught?.lessons.findIndex(one => one.slug === lesson) ?? -1
  if (!module || !taught || index < 0) throw notFound('lesson')
  return { module, taught, index }
}

/** One lesson with its place among the others; `page` is its text. 404 for what is not there, 409 `trainingClosed` outside the company's hours. */
export async function readLesson(
  work: Work, teaching: Teaching,
  { slug, lesson, language, page }: { slug: string, lesson: string, language: Language, page: { body: unknown, sources: string[] } | undefined },
): Promise<LessonView> {
  const { module, taught, index } = requireLesson(teaching, slug, lesson)
  const current = taught.lessons[index]
  if (!page || !current) throw notFound('lesson')
  requireTrainingHours(work)
  const { reads } = await progressOf(work.db, work, teaching, work.actor.personId)
  const neighbour = (at: number) => {
    const other = taught.lessons[at]
    return other ? { slug: other.slug, title: other.title[language] } : null
  }
  return {
    module: { slug, title: module.title[language] }, slug: lesson, title: current.title[language], minutes: current.minutes,
    number: index + 1, total: taught.lessons.length, read: reads.has(`${slug}/${lesson}`), language,
    sources: page.sources, previous: neighbour(index - 1), next: neighbour(index + 1), body: page.body,
  }
}

/** Records that a lesson was read to its end; again is fine, and is what opens a paused quiz. Counts its minutes where reading it was required. */
export async function markRead(work: Work, teaching: Teaching, { slug, lesson, language }: { slug: string, lesson: string, language: Language }): Promise<void> {
  const { taught, index } = requireLesson(teaching, slug, lesson)
  await work.db.transaction(async (trx) => {
    await recordLessonRead(trx, { personId: work.actor.personId, module: slug, lesson, language, now: work.now })
    await countLesson(trx, work, { module: slug, lesson, minutes: taught.lessons[index]?.minutes ?? 0 })
  })
}
