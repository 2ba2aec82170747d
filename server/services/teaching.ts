import { z } from 'zod'
import { keyProblem, type BankItem, type QuizBank } from '#shared/domain/quiz-bank'
import type { Bilingual, Language } from '#shared/domain/states'
import { units } from '#shared/domain/units'

/** What a module says about itself in one language. */
export interface ModuleText {
  summary: string
  cautions: string[]
  checklist: { id: string, text: string }[]
  sources: string[]
}

/** One lesson, without its text. */
export interface Lesson {
  slug: string
  order: number
  minutes: number
  title: Bilingual
}

/** A module that has content in both languages and a bank. The bank holds the keys: nothing of it leaves but through `toServedItem`. */
export interface TaughtModule {
  slug: string
  text: Record<Language, ModuleText>
  lessons: Lesson[]
  bank: QuizBank
}

/** Every module that is written, by slug. */
export type Teaching = ReadonlyMap<string, TaughtModule>

const bilingual = z.strictObject({ en: z.string().min(1), es: z.string().min(1) })
const base = { id: z.string().min(1), lesson: z.string(), mustKnow: z.boolean(), source: z.string().min(1), stem: bilingual, feedback: bilingual, picture: z.string().optional() }
const options = z.array(z.strictObject({ id: z.string(), text: bilingual })).min(2)
const item = z.discriminatedUnion('kind', [
  z.strictObject({ ...base, kind: z.literal('one'), options, key: z.string() }),
  z.strictObject({ ...base, kind: z.literal('place'), picture: z.string(), options, key: z.string() }),
  z.strictObject({ ...base, kind: z.literal('all'), options, key: z.array(z.string()) }),
  z.strictObject({ ...base, kind: z.literal('order'), options, key: z.array(z.string()) }),
  z.strictObject({ ...base, kind: z.literal('number'), unit: z.enum(units), units: z.array(z.enum(units)).optional(), key: z.strictObject({ value: z.number(), tolerance: z.number(), relative: z.boolean().optional() }) }),
])
const bank = z.strictObject({
  module: z.string(), quizLength: z.number().int().min(1), passMark: z.number().min(0).max(1).default(0.8),
  pauseMinutes: z.number().min(0).default(20), items: z.array(item).min(1),
})

/** Checks a bank as its file holds it; throws when an item lacks a language, a source or a fitting key. */
export function toBank(raw: unknown): QuizBank {
  const parsed: QuizBank = bank.parse(raw)
  const wrong = parsed.items.filter(one => keyProblem(one) !== null).map((one: BankItem) => `${one.id}: ${keyProblem(one)}`)
  if (wrong.length > 0) throw new Error(`The bank of ${parsed.module} has keys that don't fit: ${wrong.join(', ')}`)
  return parsed
}

interface ModulePage extends Omit<ModuleText, 'checklist'> { path: string, checklist?: ModuleText['checklist'] }
interface LessonPage { path: string, title: string, minutes: number, order: number }

const toText = ({ summary, cautions, checklist = [], sources }: ModulePage): ModuleText => ({ summary, cautions, checklist, sources })
const lastPart = (path: string) => path.split('/').at(-1) ?? ''
const moduleOf = (lessonPath: string) => lessonPath.split('/').at(-2) ?? ''

/** Puts pages of both languages and the banks together; a module that lacks one of them is not written yet. */
export function toTeaching(parts: { modules: Record<Language, ModulePage[]>, lessons: Record<Language, LessonPage[]>, banks: QuizBank[] }): Teaching {
  const teaching = new Map<string, TaughtModule>()
  for (const questions of parts.banks) {
    const slug = questions.module
    const [en, es] = (['en', 'es'] as const).map(language => parts.modules[language].find(page => lastPart(page.path) === slug))
    if (!en || !es) continue
    const spanish = new Map(parts.lessons.es.filter(page => moduleOf(page.path) === slug).map(page => [lastPart(page.path), page.title]))
    const lessons = parts.lessons.en.filter(page => moduleOf(page.path) === slug).sort((first, second) => first.order - second.order)
      .map(page => ({ slug: lastPart(page.path), order: page.order, minutes: page.minutes, title: { en: page.title, es: spanish.get(lastPart(page.path)) ?? page.title } }))
    teaching.set(slug, { slug, text: { en: toText(en), es: toText(es) }, lessons, bank: questions })
  }
  return teaching
}
