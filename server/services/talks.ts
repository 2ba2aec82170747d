import { z } from 'zod'
import { parse } from 'yaml'
import { talkHazards, seasons, workTags, type Language } from '#shared/domain/states'
import { bilingual, type BilingualCheck, type TalksView, type TalkView } from '#shared/schemas/talk'
import type { TalkTags } from '#shared/domain/suggestions'
import { canonicalJson, sha256 } from './hashing'

/** The check question with its answer: for the server only, until somebody has answered. */
const checkAnswer = z.strictObject({
  question: bilingual,
  options: z.array(z.strictObject({ id: z.string(), text: bilingual })).min(2),
  right: z.string(),
  explain: bilingual,
})
export type TalkCheck = z.infer<typeof checkAnswer>

/** A talk in one language as the content gives it. */
export interface TalkText { title: string, minutes: number, work: string[], hazards: string[], seasons: string[], sources: string[], body: unknown }

/** A talk in both languages, with what its text hashes to. */
export interface Talk extends TalkTags {
  minutes: number
  text: Record<Language, TalkText>
  hash: Record<Language, string>
  check: TalkCheck
  /** Written by the company, not shipped. */
  isCompany?: boolean
}

/** Every talk by its slug. */
export type Talks = ReadonlyMap<string, Talk>

/** Reads the check questions (YAML), by talk. Throws when one is not whole or its answer is none of its options. */
export function parseChecks(yaml: string): Map<string, TalkCheck> {
  const checks = z.record(z.string(), checkAnswer).parse(parse(yaml))
  for (const [slug, check] of Object.entries(checks)) {
    if (!check.options.some(option => option.id === check.right)) throw new Error(`The check of ${slug} has no option ${check.right}`)
  }
  return new Map(Object.entries(checks))
}

const known = <Word extends string>(words: readonly Word[], given: readonly string[]) => words.filter(word => given.includes(word))

/** Puts a talk's two languages and its check together. */
export function toTalk(slug: string, text: Record<Language, TalkText>, check: TalkCheck): Talk {
  const hashOf = ({ title, body }: TalkText) => sha256(canonicalJson({ title, body }))
  return {
    slug, text, check, minutes: text.en.minutes,
    work: known(workTags, text.en.work), hazards: known(talkHazards, text.en.hazards), seasons: known(seasons, text.en.seasons),
    hash: { en: hashOf(text.en), es: hashOf(text.es) },
  }
}

/** The question and its options in both languages, without which is right. */
export const toCheckView = ({ question, options }: TalkCheck): BilingualCheck => ({ question, options: options.map(({ id, text }) => ({ id, text })) })

/** A talk's row in a list, in one language. */
export function toListItem(talk: Talk, language: Language): TalksView['items'][number] {
  const { question, options } = talk.check
  return {
    slug: talk.slug, title: talk.text[language].title, minutes: talk.minutes, tags: [...talk.work, ...talk.hazards], isCompany: talk.isCompany ?? false, seasons: [...talk.seasons],
    check: { question: question[language], options: options.map(option => ({ id: option.id, text: option.text[language] })) },
  }
}

/** A talk to be read, in both languages. */
export function toTalkView(talk: Talk): TalkView {
  const { en, es } = talk.text
  return {
    slug: talk.slug, minutes: talk.minutes, work: [...talk.work], hazards: [...talk.hazards], isCompany: talk.isCompany ?? false, title: { en: en.title, es: es.title },
    sources: { en: en.sources, es: es.sources }, body: { en: en.body, es: es.body }, check: toCheckView(talk.check),
  }
}
