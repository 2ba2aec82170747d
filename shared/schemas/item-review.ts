import { z } from 'zod'
import { itemFlags } from '../domain/item-review'
import { reliabilities } from '../domain/review-figures'
import { itemKinds, type Language } from '../domain/states'
import { code, language, text, tableFormats } from './common'

/** Whose attempts are looked at: all, or those taken in one language from start to end. */
export const takenIns = ['all', 'en', 'es'] as const
/** One choice of attempts. */
export type TakenIn = (typeof takenIns)[number]
const takenIn = z.enum(takenIns).default('all')

/** `language` is the one to answer in; the person's own unless said. */
export const itemReviewQuery = z.strictObject({ module: code, takenIn, language: language.optional() })
export const itemReviewExportQuery = itemReviewQuery.extend({ format: z.enum(tableFormats) })
/** What a review is asked for. */
export interface ItemReviewQuestion { module: string, takenIn: TakenIn, language: Language }

/** The modules with a quiz, from the bottom of the wall. */
export const itemReviewModulesQuery = z.strictObject({ language: language.optional() })
export const itemReviewModules = z.object({ items: z.array(z.object({ slug: z.string(), title: z.string(), attempts: z.number().int() })) })
export type ItemReviewModules = z.infer<typeof itemReviewModules>

const named = z.object({ slug: z.string(), title: z.string() })
const figures = {
  id: z.string(), served: z.number().int(), p: z.number(), low: z.number().nullable(), high: z.number().nullable(),
  itemRest: z.number().nullable(), picks: z.record(z.string(), z.number().int()), flags: z.array(z.enum(itemFlags)),
  kind: z.enum(itemKinds), mustKnow: z.boolean(), lesson: named,
}
/** How often each option was picked; `isRight` marks the key. Empty for order and number items. */
const option = z.object({ id: z.string(), picks: z.number().int(), isRight: z.boolean() })

export const itemReviewLine = z.object({
  ...figures, stem: z.string(), options: z.array(option),
  struck: z.object({ reason: z.string(), by: z.string(), at: z.string() }).nullable(),
})
export type ItemReviewLine = z.infer<typeof itemReviewLine>
export const itemReviewView = z.object({
  module: named, takenIn: z.enum(takenIns), people: z.number().int(), attempts: z.number().int(), passed: z.number().int(), passMark: z.number(),
  alpha: z.number().nullable(), reliability: z.enum(reliabilities),
  scores: z.array(z.object({ from: z.number().int(), to: z.number().int(), attempts: z.number().int(), passed: z.number().int() })),
  /** The reader has an unsent attempt at this quiz, so no key is shown: `options` are left out. */
  isKeyWithheld: z.boolean(),
  items: z.array(itemReviewLine),
})
export type ItemReviewView = z.infer<typeof itemReviewView>

const bilingual = z.object({ en: z.string(), es: z.string() })
export const itemParams = z.strictObject({ item: code })
export const itemDetailQuery = z.strictObject({ takenIn, language: language.optional() })
export const itemDetailView = z.object({
  ...figures, module: named, takenIn: z.enum(takenIns), stem: bilingual, feedback: bilingual, source: z.string(), picture: z.string().optional(),
  options: z.array(option.extend({ text: bilingual })),
  /** The right number with its unit, or the ids of the steps in their right order; null for other kinds. */
  right: z.string().nullable(),
  /** For order and number items: what was answered, most often first. */
  given: z.array(z.object({ answer: z.string(), count: z.number().int(), isRight: z.boolean() })),
  isStruck: z.boolean(),
  /** The newest first. */
  strikes: z.array(z.object({ reason: z.string(), by: z.string(), at: z.string(), restored: z.object({ reason: z.string(), by: z.string(), at: z.string() }).nullable() })),
})
export type ItemDetailView = z.infer<typeof itemDetailView>

export const strikeBody = z.strictObject({ reason: text(1000) })
/** What a strike changes: failed attempts that pass without the item, their people, and the credentials issued at once. */
export const strikeView = z.object({ item: z.string(), isStruck: z.boolean(), attempts: z.number().int(), people: z.number().int(), credentials: z.number().int() })
export type StrikeView = z.infer<typeof strikeView>
