import { randomUUID } from 'node:crypto'
import { moduleBySlug } from '#shared/domain/curriculum'
import type { Language } from '#shared/domain/states'
import { companyTalkBody, type CompanyTalkBody, type CompanyTalkChanges, type CompanyTalkView, type ModuleNoteView } from '#shared/schemas/company-texts'
import { appendAudit } from '../data/audit'
import { findCompanyText, insertCompanyText, listCompanyTexts, listVersions, type CompanyText } from '../data/company-texts'
import type { Db } from '../data/database'
import { toTextTree, type TextTree } from './company-markdown'
import { notFound, Refusal } from './refusal'
import { toTalk, type Talk, type Talks, type TalkText } from './talks'
import type { Work } from './work'

const changedMeanwhile = (version: number) => new Refusal('conflict', 'changedMeanwhile', { message: 'Somebody saved another version meanwhile', data: { version } })

/** A company's talk as the briefings take it; who reads the language that is missing gets the other. */
export function companyTalk({ slug, data }: Pick<CompanyText, 'slug' | 'data'>): Talk {
  const { title, minutes, work, hazards, seasons, sources, text, check } = companyTalkBody.parse(data)
  const inLanguage = (language: Language): TalkText => {
    const from = title[language] === '' ? (language === 'en' ? 'es' : 'en') : language
    return { title: title[from], minutes, work, hazards, seasons, sources, body: toTextTree(text[from]) }
  }
  return { ...toTalk(slug, { en: inLanguage('en'), es: inLanguage('es') }, check), isCompany: true }
}

const parsed = new Map<string, Talk>()

/** The company's talks that are not retired, beside the shipped ones. */
export async function withCompanyTalks(db: Db, shipped: Talks): Promise<Talks> {
  const own = (await listCompanyTexts(db, 'talk', 'newest')).filter(text => !text.isRetired)
  if (own.length === 0) return shipped
  const talks = new Map(shipped)
  for (const text of own) {
    const talk = parsed.get(text.id) ?? companyTalk(text)
    parsed.set(text.id, talk)
    talks.set(text.slug, talk)
  }
  return talks
}

/** The version of a company's talk whose text hashes to this, so that an old sheet shows what was read; undefined when there is none. */
export async function findTalkAsRead(db: Db, slug: string, hash: string): Promise<Talk | undefined> {
  return (await listCompanyTexts(db, 'talk', 'all')).filter(text => text.slug === slug).map(companyTalk).find(talk => talk.hash.en === hash || talk.hash.es === hash)
}

const slugFrom = (title: string) => `own-${title.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase().replace(/[^a-z0-9]+/g, '-').replace(/^-|-$/g, '').slice(0, 48) || 'talk'}`

async function freeSlug(db: Db, title: string): Promise<string> {
  const wanted = slugFrom(title).replace(/-+$/, '')
  for (let number = 1; ; number++) {
    const slug = number === 1 ? wanted : `${wanted}-${number}`
    if (!await findCompanyText(db, 'talk', slug)) return slug
  }
}

async function save(trx: Db, work: Work, text: Pick<CompanyText, 'kind' | 'slug' | 'version' | 'data' | 'isRetired'>): Promise<void> {
  await insertCompanyText(trx, { id: randomUUID(), ...text, savedBy: work.actor.personId, savedAt: work.now })
  await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: `${text.kind}.saved`, subject: { kind: text.kind, id: text.slug }, after: { version: text.version, isRetired: text.isRetired } })
}

/** Writes a talk of the company's own; its slug comes from its title. */
export async function addCompanyTalk(work: Work, talk: CompanyTalkBody): Promise<CompanyTalkView> {
  const slug = await work.db.transaction(async (trx) => {
    const free = await freeSlug(trx, talk.title.en || talk.title.es)
    await save(trx, work, { kind: 'talk', slug: free, version: 1, data: talk, isRetired: false })
    return free
  })
  return readCompanyTalk(work, { slug })
}

/** A company's talk to be changed: the newest version, or one of the older. 404 for no such talk or version. */
export async function readCompanyTalk(work: Work, { slug, version }: { slug: string, version?: number }): Promise<CompanyTalkView> {
  const newest = await findCompanyText(work.db, 'talk', slug)
  const text = version === undefined ? newest : await findCompanyText(work.db, 'talk', slug, version)
  if (!newest || !text) throw notFound('talk')
  return { slug, version: newest.version, isRetired: newest.isRetired, talk: companyTalkBody.parse(text.data), versions: await listVersions(work.db, 'talk', slug) }
}

/** Saves the next version; 404 for no such talk, 409 `changedMeanwhile` when somebody saved since it was read. */
export async function changeCompanyTalk(work: Work, slug: string, { version, talk, isRetired }: CompanyTalkChanges): Promise<CompanyTalkView> {
  await work.db.transaction(async (trx) => {
    const newest = await findCompanyText(trx, 'talk', slug)
    if (!newest) throw notFound('talk')
    if (newest.version !== version) throw changedMeanwhile(newest.version)
    await save(trx, work, { kind: 'talk', slug, version: version + 1, data: talk ?? newest.data, isRetired: isRetired ?? newest.isRetired })
  })
  return readCompanyTalk(work, { slug })
}

interface NoteData { en: string, es: string }

/** The company's note on a module, empty at version 0 while there is none. 404 for no such module. */
export async function readModuleNote(work: Work, slug: string): Promise<ModuleNoteView> {
  if (!moduleBySlug(slug)) throw notFound('module')
  const note = await findCompanyText(work.db, 'moduleNote', slug)
  return { module: slug, version: note?.version ?? 0, text: note?.data as NoteData | undefined ?? { en: '', es: '' }, versions: await listVersions(work.db, 'moduleNote', slug) }
}

/** Saves the company's note on a module as its next version; empty in both languages takes it off. 409 `changedMeanwhile`. */
export async function saveModuleNote(work: Work, slug: string, { version, text }: { version: number, text: NoteData }): Promise<ModuleNoteView> {
  if (!moduleBySlug(slug)) throw notFound('module')
  await work.db.transaction(async (trx) => {
    const newest = await findCompanyText(trx, 'moduleNote', slug)
    if ((newest?.version ?? 0) !== version) throw changedMeanwhile(newest?.version ?? 0)
    await save(trx, work, { kind: 'moduleNote', slug, version: version + 1, data: text, isRetired: text.en === '' && text.es === '' })
  })
  return readModuleNote(work, slug)
}

/** The note to be shown on a module's page in a language, or undefined. */
export async function shownNote(db: Db, slug: string, language: Language): Promise<TextTree | undefined> {
  const note = await findCompanyText(db, 'moduleNote', slug)
  const text = note?.data as NoteData | undefined
  const words = text && (text[language] || text.en || text.es)
  return words ? toTextTree(words) : undefined
}
