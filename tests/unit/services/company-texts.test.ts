import { beforeEach, describe, expect, it } from 'vitest'
import type { CompanyTalkBody } from '#shared/schemas/company-texts'
import type { Db } from '~~/server/data/database'
import { toTextTree } from '~~/server/services/company-markdown'
import { addCompanyTalk, changeCompanyTalk, findTalkAsRead, readCompanyTalk, readModuleNote, saveModuleNote, shownNote, withCompanyTalks } from '~~/server/services/company-texts'
import { Refusal } from '~~/server/services/refusal'
import type { Talks } from '~~/server/services/talks'
import { openLearningCompany, workAfter } from '../../support/learning-company'

const talk = (changes: Partial<CompanyTalkBody> = {}): CompanyTalkBody => ({
  title: { en: 'Our north gate', es: 'Nuestra entrada norte' }, minutes: 5, work: ['drive'], hazards: ['traffic'], seasons: [], sources: ['Company rule'],
  text: { en: '## Ask first\n\nWho opens it?', es: '## Pregunte primero\n\n¿Quién la abre?' },
  check: { question: { en: 'Who?', es: '¿Quién?' }, options: (['a', 'b', 'c'] as const).map(id => ({ id, text: { en: id, es: id } })), right: 'b', explain: { en: 'Because.', es: 'Porque sí.' } },
  ...changes,
})
const noTalks: Talks = new Map()
const flat = (tree: unknown) => JSON.stringify(tree)

let db: Db
beforeEach(async () => {
  db = await openLearningCompany()
})
const sara = (minutes = 0) => workAfter(db, 'sara', minutes, 'safety')
async function refusalOf(promise: Promise<unknown>) {
  const error = await promise.then(() => null, (reason: unknown) => reason)
  if (!(error instanceof Refusal)) throw new Error(`not refused: ${String(error)}`)
  return { kind: error.kind, code: error.code }
}

describe('a talk of the company\'s own', () => {
  it('stands beside the shipped ones, with its check question and tags', async () => {
    const { slug } = await addCompanyTalk(await sara(), talk())
    expect(slug).toBe('own-our-north-gate')
    const [own] = [...(await withCompanyTalks(db, noTalks)).values()]
    expect(own).toMatchObject({ slug, isCompany: true, minutes: 5, work: ['drive'], hazards: ['traffic'], check: { right: 'b' } })
    expect(own!.text.es.title).toBe('Nuestra entrada norte')
    expect((await addCompanyTalk(await sara(1), talk())).slug).toBe('own-our-north-gate-2')
  })

  it('keeps every version, and what was read at a briefing stays as it was', async () => {
    const { slug } = await addCompanyTalk(await sara(), talk())
    const asRead = (await withCompanyTalks(db, noTalks)).get(slug)!
    const changed = await changeCompanyTalk(await sara(5), slug, { version: 1, talk: talk({ text: { en: 'All new.', es: 'Todo nuevo.' } }) })
    expect(changed).toMatchObject({ version: 2, versions: [{ version: 2, savedBy: 'Person sara' }, { version: 1 }] })
    expect((await withCompanyTalks(db, noTalks)).get(slug)!.hash.en).not.toBe(asRead.hash.en)
    expect(flat((await findTalkAsRead(db, slug, asRead.hash.en))!.text.en.body)).toContain('Who opens it?')
    expect((await readCompanyTalk(await sara(), { slug, version: 1 })).talk.text.en).toContain('Who opens it?')
  })

  it('is not overwritten by somebody who read an older version', async () => {
    const { slug } = await addCompanyTalk(await sara(), talk())
    await changeCompanyTalk(await sara(), slug, { version: 1, talk: talk({ minutes: 9 }) })
    expect(await refusalOf(changeCompanyTalk(await sara(), slug, { version: 1, talk: talk({ minutes: 3 }) }))).toEqual({ kind: 'conflict', code: 'changedMeanwhile' })
    expect(await refusalOf(changeCompanyTalk(await sara(), 'own-nothing', { version: 1 }))).toMatchObject({ kind: 'notFound' })
  })

  it('is no longer offered once it is retired, and comes back when it is taken into use again', async () => {
    const { slug } = await addCompanyTalk(await sara(), talk())
    await changeCompanyTalk(await sara(), slug, { version: 1, isRetired: true })
    expect((await withCompanyTalks(db, noTalks)).size).toBe(0)
    await changeCompanyTalk(await sara(), slug, { version: 2, isRetired: false })
    expect((await withCompanyTalks(db, noTalks)).size).toBe(1)
  })

  it('written in one language is read in that one by everybody', async () => {
    const { slug } = await addCompanyTalk(await sara(), talk({ title: { en: '', es: 'Solo español' }, text: { en: '', es: 'Hola.' } }))
    expect((await withCompanyTalks(db, noTalks)).get(slug)!.text.en.title).toBe('Solo español')
  })
})

describe('a company\'s note on a module', () => {
  it('is shown in the reader\'s language, keeps its versions, and goes when it is emptied', async () => {
    expect(await readModuleNote(await sara(), 'stacking')).toMatchObject({ version: 0, text: { en: '', es: '' } })
    await saveModuleNote(await sara(), 'stacking', { version: 0, text: { en: 'Our block: **4 courses**.', es: '' } })
    expect(flat(await shownNote(db, 'stacking', 'es'))).toContain('4 courses')
    expect(await refusalOf(saveModuleNote(await sara(), 'stacking', { version: 0, text: { en: 'x', es: '' } }))).toEqual({ kind: 'conflict', code: 'changedMeanwhile' })
    await saveModuleNote(await sara(), 'stacking', { version: 1, text: { en: '', es: '' } })
    expect(await shownNote(db, 'stacking', 'en')).toBeUndefined()
    expect(await refusalOf(readModuleNote(await sara(), 'welding'))).toMatchObject({ kind: 'notFound' })
  })
})

describe('a company\'s Markdown', () => {
  it('has headings below the page\'s own, lists, bold, and a caution for a quotation', () => {
    const text = flat(toTextTree('# Gate\n\n3. **Three**\n4. Four\n\n> Mind the truck'))
    expect(text).toContain('"tag":"h2"')
    expect(text).toContain('"start":3')
    expect(text).toContain('"tag":"lesson-caution"')
  })

  it.each([
    '<img src=x onerror=alert(1)>', '<script>alert(1)</script>', '[tap](javascript:alert(1))', '[tap](JaVaScRiPt:alert(1))', '[tap](data:text/html,x)', '![p](https://example.org/p.png)',
    '<iframe src="//example.org"></iframe>', '[tap](//example.org)', '<a href="/x" onclick="alert(1)">x</a>', '::secret-component{onload="x"}\n::',
  ])('never lets %s become more than words', (markdown) => {
    const nodes: { tag?: string, props?: Record<string, unknown>, children?: unknown[] }[] = []
    const walk = (node: typeof nodes[number]) => {
      nodes.push(node)
      for (const child of node.children ?? []) walk(child as typeof nodes[number])
    }
    walk(toTextTree(markdown))
    expect(nodes.map(node => node.tag).filter(tag => tag !== undefined && tag !== 'p')).toEqual([])
  })

  it('keeps links to the web and to our own pages', () => {
    expect(flat(toTextTree('[a](https://example.org) [b](/learn/stacking)'))).toContain('"href":"/learn/stacking"')
  })
})
