import { modules } from '#shared/domain/curriculum'
import { reviewItems, type ItemFigures } from '#shared/domain/item-review'
import type { BankItem } from '#shared/domain/quiz-bank'
import { reliabilityOf, scoreBands, wilsonInterval } from '#shared/domain/review-figures'
import type { Language } from '#shared/domain/states'
import type { ItemReviewModules, ItemReviewQuestion, ItemReviewView } from '#shared/schemas/item-review'
import { countModuleAttempts, findRunningAttempt } from '../data/attempts'
import { listStanding } from '../data/struck-items'
import { requireModule } from './bank-items'
import { Refusal } from './refusal'
import { loadAttempts, optionsOf, toReviewed } from './review-attempts'
import type { TaughtModule, Teaching } from './teaching'
import type { Work } from './work'

/** The modules that have a quiz, from the bottom of the wall, with their graded attempts counted. */
export async function listReviewable(work: Work, teaching: Teaching, language: Language): Promise<ItemReviewModules> {
  const counts = await countModuleAttempts(work.db)
  return { items: modules.filter(({ slug }) => teaching.has(slug)).map(({ slug, title }) => ({ slug, title: title[language], attempts: counts.get(slug) ?? 0 })) }
}

/** A manager in the middle of the same quiz sees no key before it is sent, like everybody else. */
const isKeyWithheld = async ({ db, actor, now }: Work, slug: string) => await findRunningAttempt(db, actor.personId, slug, now) !== undefined

/** Refuses with 409 `ownAttemptRuns` what would show the actor the key of a quiz that they are in. */
export async function refuseWithheld(work: Work, slug: string): Promise<void> {
  if (await isKeyWithheld(work, slug)) throw new Refusal('conflict', 'ownAttemptRuns', { message: 'Send your own quiz first' })
}

/** An item's figures with what a table says about it. */
export function toLine({ taught, item, figures, language }: { taught: TaughtModule, item: BankItem, figures: ItemFigures, language: Language }) {
  const interval = wilsonInterval(figures.p, figures.served)
  const lesson = taught.lessons.find(one => one.slug === item.lesson)
  return {
    ...figures, low: interval?.low ?? null, high: interval?.high ?? null, kind: item.kind, mustKnow: item.mustKnow,
    lesson: { slug: item.lesson, title: lesson?.title[language] ?? item.lesson },
  }
}

/**
 * How a module's items did over every graded attempt, without names. 404 for no such module; a module without a quiz
 * has no items.
 */
export async function reviewModuleItems(work: Work, teaching: Teaching, { module: slug, takenIn, language }: ItemReviewQuestion): Promise<ItemReviewView> {
  const module = requireModule(slug)
  const taught = teaching.get(slug)
  const attempts = await loadAttempts(work, slug, takenIn)
  const standing = new Map((await listStanding(work.db, slug)).map(strike => [strike.itemId, { reason: strike.reason, by: strike.striker, at: strike.struckAt }]))
  const bankItems = taught?.bank.items ?? []
  const { items, people, alpha } = reviewItems(bankItems.map(item => item.id), attempts.map(toReviewed), new Set(standing.keys()))
  const isWithheld = await isKeyWithheld(work, slug)
  return {
    module: { slug, title: module.title[language] }, takenIn, people, attempts: attempts.length, passed: attempts.filter(attempt => attempt.passed).length,
    passMark: taught?.bank.passMark ?? 0, alpha, reliability: reliabilityOf(alpha, attempts.length),
    scores: scoreBands(attempts.map(({ score, passed }) => ({ score: score ?? 0, passed: passed ?? false }))), isKeyWithheld: isWithheld,
    items: bankItems.flatMap((item, index) => {
      const figures = items[index]
      if (!taught || !figures) return []
      const options = isWithheld ? [] : optionsOf(item, attempts).map(({ text: _text, ...option }) => option)
      return [{ ...toLine({ taught, item, figures, language }), ...(isWithheld && { picks: {} }), stem: item.stem[language], options, struck: standing.get(item.id) ?? null }]
    }),
  }
}
