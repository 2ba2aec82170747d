import { existsSync } from 'node:fs'
import { resolve } from 'node:path'
import { describe, expect, it } from 'vitest'
import { modules } from '#shared/domain/curriculum'
import { itemKinds } from '#shared/domain/states'
import { drawingFile, drawingsIn, hasSource, lessonsOf, listContent, numbersIn, piecesIn, readContent } from '../../support/content-files'
import { readRealBanks } from '../../support/teaching'

const banks = new Map(readRealBanks().map(bank => [bank.module, bank]))
const headings = { en: ['Why it hurts', 'Do it like this', 'Stop if'], es: ['Por qué lastima', 'Hágalo así', 'Alto si'] }
const headingsOf = (body: string) => [...body.matchAll(/^## (.+)$/gm)].map(match => match[1])
const sorted = (list: readonly string[]) => [...list].sort()

describe('the training wall', () => {
  it('has content and a bank for each of its 16 modules, and none besides', () => {
    const slugs = sorted(modules.map(module => module.slug))
    expect(listContent('en/modules')).toEqual(slugs)
    expect(listContent('es/modules')).toEqual(slugs)
    expect(sorted([...banks.keys()])).toEqual(slugs)
  })
})

describe.each([...banks.keys()])('the module %s', (slug) => {
  const lessons = { en: lessonsOf('en', slug), es: lessonsOf('es', slug) }
  const index = { en: readContent(`en/modules/${slug}/index.md`), es: readContent(`es/modules/${slug}/index.md`) }
  const bank = banks.get(slug)!

  it('has 3 to 6 lessons of 3 to 7 minutes, in order, under the same names in both languages', () => {
    expect(listContent(`es/modules/${slug}`)).toEqual(listContent(`en/modules/${slug}`))
    expect(lessons.en.length).toBeGreaterThanOrEqual(3)
    expect(lessons.en.length).toBeLessThanOrEqual(6)
    for (const language of ['en', 'es'] as const) {
      expect(lessons[language].map(lesson => lesson.front.order)).toEqual(lessons.en.map((_, at) => at + 1))
      for (const { front } of lessons[language]) expect([3, 4, 5, 6, 7]).toContain(front.minutes)
    }
    expect(lessons.es.map(lesson => lesson.front.minutes)).toEqual(lessons.en.map(lesson => lesson.front.minutes))
  })

  it('says on its first page that maker, engineer, code and competent person come first, and where things come from', () => {
    const cautions = { en: [/maker/i, /engineer/i, /code/i, /competent person/i], es: [/fabricante/i, /ingenier/i, /código/i, /persona competente/i] }
    for (const language of ['en', 'es'] as const) {
      const text = (index[language].front.cautions as string[]).join(' ')
      for (const word of cautions[language]) expect(text).toMatch(word)
      expect((index[language].front.sources as string[]).length).toBeGreaterThan(0)
    }
    const steps = (language: 'en' | 'es') => (index[language].front.checklist as { id: string }[] | undefined ?? []).map(step => step.id)
    expect(steps('es')).toEqual(steps('en'))
    expect(new Set(steps('en')).size).toBe(steps('en').length)
    expect(steps('en').length).toBeGreaterThanOrEqual(5)
  })

  it.each(lessons.en.map((lesson, at) => [lesson.path.split('/').at(-1)!, lesson, lessons.es[at]!] as const))('the lesson %s says the same in both languages, with why, how, stop, drawing and caution', (_name, en, es) => {
    expect(headingsOf(en.body)).toEqual(headings.en)
    expect(headingsOf(es.body)).toEqual(headings.es)
    expect(drawingsIn(es.body)).toEqual(drawingsIn(en.body))
    expect(piecesIn(es.body)).toEqual(piecesIn(en.body))
    expect(drawingsIn(en.body).length).toBeGreaterThan(0)
    for (const body of [en.body, es.body]) expect(body).toMatch(/::lesson-caution\n[\s\S]+?\n::/)
    expect(sorted(numbersIn(es.body))).toEqual(sorted(numbersIn(en.body)))
    for (const { front } of [en, es]) expect((front.sources as string[]).length).toBeGreaterThan(0)
    expect((es.front.sources as string[]).length).toBe((en.front.sources as string[]).length)
    for (const piece of piecesIn(en.body)) expect(existsSync(resolve(import.meta.dirname, '../../../components/content', `${piece.split('-').map(part => part.charAt(0).toUpperCase() + part.slice(1)).join('')}.vue`))).toBe(true)
    for (const [link, target] of en.body.matchAll(/\]\(([^)]+)\)/g)) expect([link, existsSync(resolve(import.meta.dirname, '../../../content/en', target!))]).toEqual([link, true])
  })

  it('names the source of its numbers with units beside them, at least once in each paragraph that has some', () => {
    const bare = (['en', 'es'] as const).flatMap(language => lessons[language].flatMap(({ path, body }) => body.split(/\n\n/).filter((paragraph) => {
      const withUnits = numbersIn(paragraph).filter(number => /\d\s?(lb|ft|in|°F|mph|psi|kV|yd)/.test(number))
      return withUnits.length > 0 && !hasSource.test(paragraph) && !paragraph.startsWith('::') && !/^## (Stop if|Alto si)/.test(paragraph) && !/^- /.test(paragraph)
    }).map(paragraph => `${path}: ${paragraph.slice(0, 120)}`)))
    expect(bare).toEqual([])
  })

  it('shows drawings that have a title and a description in both languages', () => {
    const names = [...new Set([...lessons.en.flatMap(lesson => drawingsIn(lesson.body)), ...bank.items.flatMap(item => item.picture ?? [])])]
    for (const name of names) {
      const file = drawingFile(name)
      expect([name, file?.match(/title: '/g)?.length ?? file?.match(/title: ["'`]/g)?.length, file?.match(/description: ["'`]/g)?.length]).toEqual([name, 2, 2])
      expect(file).not.toMatch(/<image|href="http/)
    }
  })

  it('has at least 24 questions over all five kinds, at least four of them must-know, on every lesson', () => {
    expect(bank.items.length).toBeGreaterThanOrEqual(24)
    expect(sorted([...new Set(bank.items.map(item => item.kind))])).toEqual(sorted(itemKinds))
    expect(bank.items.filter(item => item.mustKnow).length).toBeGreaterThanOrEqual(4)
    const slugs = lessons.en.map(lesson => lesson.path.split('/').at(-1)!.replace(/^\d+\.|\.md$/g, ''))
    expect(sorted([...new Set(bank.items.map(item => item.lesson))])).toEqual(sorted(slugs))
    for (const item of bank.items) {
      expect(item.id).toMatch(new RegExp(`^${slug}-\\d{2}$`))
      if (item.picture) expect([item.id, drawingFile(item.picture) !== undefined]).toEqual([item.id, true])
    }
  })
})
