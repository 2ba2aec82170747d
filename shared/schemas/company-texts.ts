import { z } from 'zod'
import { seasons, talkHazards, workTags } from '../domain/states'
import { code, line, text } from './common'

/** Words in both languages of which one may be missing, not both. */
const either = (most: number) => z.strictObject({ en: z.string().trim().max(most).default(''), es: z.string().trim().max(most).default('') })
  .refine(words => words.en !== '' || words.es !== '', 'write it in at least one language')
const both = (most: number) => z.strictObject({ en: line(most), es: line(most) })

export const companyTalkBody = z.strictObject({
  title: either(120), minutes: z.number().int().min(3).max(15),
  work: z.array(z.enum(workTags)).max(workTags.length), hazards: z.array(z.enum(talkHazards)).max(talkHazards.length), seasons: z.array(z.enum(seasons)).max(seasons.length),
  text: either(12_000), sources: z.array(line(200)).max(20),
  check: z.strictObject({ question: both(300), options: z.array(z.strictObject({ id: z.enum(['a', 'b', 'c']), text: both(200) })).length(3), right: z.enum(['a', 'b', 'c']), explain: both(600) })
    .refine(check => new Set(check.options.map(option => option.id)).size === 3, { path: ['options'], message: 'must be a, b and c' }),
}).refine(talk => (talk.title.en !== '') === (talk.text.en !== '') && (talk.title.es !== '') === (talk.text.es !== ''), { path: ['text'], message: 'title and text belong together in each language' })
export type CompanyTalkBody = z.infer<typeof companyTalkBody>
/** What a save changes: the whole talk, on the version that was read; or whether it is retired. */
export const companyTalkChanges = z.strictObject({ version: z.number().int().min(1), talk: companyTalkBody.optional(), isRetired: z.boolean().optional() })
export type CompanyTalkChanges = z.infer<typeof companyTalkChanges>

const savedVersion = z.object({ version: z.number().int(), savedAt: z.string(), savedBy: z.string() })
export const companyTalkView = z.object({ slug: z.string(), version: z.number().int(), isRetired: z.boolean(), talk: companyTalkBody, versions: z.array(savedVersion) })
export type CompanyTalkView = z.infer<typeof companyTalkView>
export const versionQuery = z.strictObject({ version: z.coerce.number().int().min(1).optional() })

export const previewBody = z.strictObject({ text: z.string().max(12_000) })
export const previewView = z.object({ body: z.unknown() })

export const moduleNoteBody = z.strictObject({ version: z.number().int().min(0), text: z.strictObject({ en: text(4000).or(z.literal('')), es: text(4000).or(z.literal('')) }) })
export const moduleNoteView = z.object({ module: z.string(), version: z.number().int(), text: z.object({ en: z.string(), es: z.string() }), versions: z.array(savedVersion) })
export type ModuleNoteView = z.infer<typeof moduleNoteView>
export const moduleNoteParams = z.strictObject({ slug: code })
