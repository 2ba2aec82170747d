import { z } from 'zod'
import { talkHazards, workTags } from '../domain/states'
import { code, date, id, language } from './common'
import { weatherQuery } from './weather'

export const bilingual = z.object({ en: z.string(), es: z.string() })

/** The talk's check question, without its answer. */
export const checkView = z.object({ question: z.string(), options: z.array(z.object({ id: z.string(), text: z.string() })) })
export const bilingualCheck = z.object({ question: bilingual, options: z.array(z.object({ id: z.string(), text: bilingual })) })
export type BilingualCheck = z.infer<typeof bilingualCheck>

export const talkListItem = z.object({
  slug: z.string(),
  title: z.string(),
  minutes: z.number().int(),
  tags: z.array(z.string()),
  /** Written by the company, not shipped. */
  isCompany: z.boolean(),
  seasons: z.array(z.string()),
  check: checkView,
})
export const talksQuery = z.strictObject({ language: language.optional() })
export const talksView = z.object({ items: z.array(talkListItem) })
export type TalksView = z.infer<typeof talksView>

/** A talk to be read, in both languages; the bodies are Nuxt Content's document trees. */
export const talkView = z.object({
  slug: z.string(),
  minutes: z.number().int(),
  work: z.array(z.string()),
  hazards: z.array(z.string()),
  isCompany: z.boolean(),
  title: bilingual,
  sources: z.object({ en: z.array(z.string()), es: z.array(z.string()) }),
  body: z.object({ en: z.unknown(), es: z.unknown() }),
  check: bilingualCheck,
})
export type TalkView = z.infer<typeof talkView>
/** A talk as it was read: the hash that its briefing kept. */
export const talkQuery = z.strictObject({ hash: z.string().regex(/^[0-9a-f]{64}$/).optional() })
export const talkParams = z.strictObject({ slug: code })

/** `stack,brace` in a query string. */
export const workList = z.string().max(200).transform(text => text.split(',').map(tag => tag.trim()).filter(Boolean))
  .pipe(z.array(z.enum(workTags)).max(workTags.length)).optional()

export const suggestionReason = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('work'), tags: z.array(z.enum(workTags)) }),
  z.object({ kind: z.literal('weather'), tags: z.array(z.enum(talkHazards)) }),
  z.object({ kind: z.literal('nearMiss'), date: z.string(), isHere: z.boolean() }),
  z.object({ kind: z.literal('neverHere') }),
  z.object({ kind: z.literal('notLately'), days: z.number().int() }),
  z.object({ kind: z.literal('justGiven'), days: z.number().int() }),
  z.object({ kind: z.literal('rotation') }),
  z.object({ kind: z.literal('season') }),
])
export const suggestionsQuery = z.strictObject({ site: id, date: date.optional(), work: workList, ...weatherQuery })
export const suggestionView = talkListItem.extend({ score: z.number(), reasons: z.array(suggestionReason) })
export const suggestionsView = z.object({ items: z.array(suggestionView) })
export type SuggestionView = z.infer<typeof suggestionView>
