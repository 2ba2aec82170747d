import { readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import { describe, expect, it } from 'vitest'
import { parse } from 'yaml'
import { talkHazards, workTags } from '#shared/domain/states'
import { hasSource, listContent, numbersIn, readContent } from '../../support/content-files'

interface Check { question: { en: string, es: string }, options: { id: string, text: { en: string, es: string } }[], right: string, explain: { en: string, es: string } }
const checks = parse(readFileSync(resolve(import.meta.dirname, '../../../server/assets/talk-checks.yaml'), 'utf8')) as Record<string, Check>
const names = listContent('en/talks')
const slugs = names.map(name => name.replace(/\.md$/, ''))
const headings = { en: ['Ask first', 'Three points', 'What went wrong somewhere', 'What we do today'], es: ['Pregunte primero', 'Tres puntos', 'Qué salió mal en otro lugar', 'Qué hacemos hoy'] }
const seasons = ['winter', 'spring', 'summer', 'autumn']

describe('the talk library', () => {
  it('has at least 48 talks, each in both languages with its check question', () => {
    expect(names.length).toBeGreaterThanOrEqual(48)
    expect(listContent('es/talks')).toEqual(names)
    expect(Object.keys(checks).sort()).toEqual([...slugs].sort())
  })

  it('covers every kind of work and every hazard of the list', () => {
    const fronts = names.map(name => readContent(`en/talks/${name}`).front)
    expect(workTags.filter(tag => !fronts.some(front => (front.work as string[]).includes(tag)))).toEqual([])
    expect(talkHazards.filter(tag => !fronts.some(front => (front.hazards as string[]).includes(tag)))).toEqual([])
  })

  it('spreads the right answers of its checks, and does not give them away by length', () => {
    const all = Object.values(checks)
    for (const position of [0, 1, 2]) expect(all.filter(check => check.options.findIndex(option => option.id === check.right) === position).length / all.length).toBeLessThan(0.5)
    for (const language of ['en', 'es'] as const) {
      const longest = all.filter(check => check.options.every(option => option.id === check.right || option.text[language].length < check.options.find(one => one.id === check.right)!.text[language].length))
      expect(longest.length / all.length).toBeLessThan(0.4)
    }
  })
})

describe.each(slugs)('the talk %s', (slug) => {
  const en = readContent(`en/talks/${slug}.md`)
  const es = readContent(`es/talks/${slug}.md`)

  it('has one form in both languages: question, three points, what went wrong, what we do today', () => {
    for (const [language, file] of [['en', en], ['es', es]] as const) {
      expect([...file.body.matchAll(/^## (.+)$/gm)].map(match => match[1])).toEqual(headings[language])
      const points = file.body.split(/^## /m)[2]!
      expect([...points.matchAll(/^\d+\. \*\*/gm)]).toHaveLength(3)
      expect(file.body).toMatch(/::lesson-caution\n[\s\S]+?\n::/)
      const words = file.body.split(/\s+/).length
      expect(words).toBeGreaterThan(280)
      expect(words).toBeLessThan(650)
      expect((file.front.sources as string[]).length).toBeGreaterThan(0)
    }
    for (const key of ['minutes', 'work', 'hazards', 'seasons']) expect(es.front[key]).toEqual(en.front[key])
    expect([5, 6, 7, 8, 9, 10]).toContain(en.front.minutes)
    expect((en.front.work as string[]).filter(tag => !(workTags as readonly string[]).includes(tag))).toEqual([])
    expect((en.front.hazards as string[]).filter(tag => !(talkHazards as readonly string[]).includes(tag))).toEqual([])
    expect((en.front.seasons as string[]).filter(tag => !seasons.includes(tag))).toEqual([])
  })

  it('gives the same numbers in both languages', () => {
    expect(numbersIn(es.body).sort()).toEqual(numbersIn(en.body).sort())
  })

  it('names the source of its numbers with units, in the paragraph that has them', () => {
    const bare = [en, es].flatMap(({ path, body }) => body.split(/\n\n/).filter(paragraph => numbersIn(paragraph).some(number => /\d\s?(lb|ft|°F|mph|psi|kV|yd)/.test(number)) && !hasSource.test(paragraph)).map(paragraph => `${path}: ${paragraph.slice(0, 90)}`))
    expect(bare).toEqual([])
  })

  it('has a check question of three answers with its reason', () => {
    const check = checks[slug]!
    expect(check.options.map(option => option.id)).toEqual(['a', 'b', 'c'])
    expect(['a', 'b', 'c']).toContain(check.right)
    for (const language of ['en', 'es'] as const) for (const text of [check.question[language], check.explain[language], ...check.options.map(option => option.text[language])]) expect(text.length).toBeGreaterThan(3)
  })
})
