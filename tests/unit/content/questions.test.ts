import { describe, expect, it } from 'vitest'
import type { BankItem } from '#shared/domain/quiz-bank'
import type { Language } from '#shared/domain/states'
import { numbersIn } from '../../support/content-files'
import { readRealBanks } from '../../support/teaching'

const banks = readRealBanks()
const items = banks.flatMap(bank => bank.items)
const choices = items.filter((item): item is Extract<BankItem, { kind: 'one' }> => item.kind === 'one')
const wordsOf = (text: string) => new Set(text.toLowerCase().match(/[\p{L}\d]{3,}/gu) ?? [])

/** How alike two texts are by their words, 0 to 1 (Jaccard index). */
function likeness(first: Set<string>, second: Set<string>): number {
  const shared = [...first].filter(word => second.has(word)).length
  return shared / (first.size + second.size - shared || 1)
}
const isKeyLongest = (item: typeof choices[number], language: Language) => {
  const key = item.options.find(option => option.id === item.key)!.text[language].length
  return item.options.every(option => option.id === item.key || option.text[language].length < key)
}

describe('the questions of all banks', () => {
  it('have ids that are unique for ever', () => {
    expect(new Set(items.map(item => item.id)).size).toBe(items.length)
  })

  it.each(['en', 'es'] as const)('ask no two things alike in %s', (language) => {
    const alike: string[] = []
    const texts = items.map(item => wordsOf(`${item.stem[language]} ${'options' in item && item.kind !== 'place' ? item.options.map(option => option.text[language]).join(' ') : item.picture ?? ''} ${item.feedback[language]}`))
    for (const [at, first] of texts.entries()) {
      for (let other = at + 1; other < texts.length; other++) if (likeness(first, texts[other]!) > 0.7) alike.push(`${items[at]!.id} and ${items[other]!.id}`)
    }
    expect(alike).toEqual([])
  })

  it.each(banks.map(bank => bank.module))('of %s: the key is the longest answer in fewer than 40 in 100, in each language', (module) => {
    for (const language of ['en', 'es'] as const) {
      const own = choices.filter(item => item.id.startsWith(`${module}-`))
      expect([module, language, own.filter(item => isKeyLongest(item, language)).length / own.length < 0.4]).toEqual([module, language, true])
    }
  })

  it('spread their keys over the positions: none holds more than 40 in 100 of a bank or 32 of all', () => {
    const shareOf = (list: typeof choices) => Math.max(...['a', 'b', 'c', 'd'].map(position => list.filter(item => item.options.findIndex(option => option.id === item.key) === 'abcd'.indexOf(position)).length / list.length))
    for (const { module } of banks) expect([module, shareOf(choices.filter(item => item.id.startsWith(`${module}-`))) <= 0.42]).toEqual([module, true])
    expect(shareOf(choices)).toBeLessThan(0.32)
  })

  it('hold the same numbers in both languages, and teach in their feedback', () => {
    const parts = (item: BankItem, language: Language) => [item.stem[language], item.feedback[language], ...('options' in item ? item.options.map(option => option.text[language]) : [])]
    const different = items.filter(item => parts(item, 'en').some((text, at) => numbersIn(text).sort().join() !== numbersIn(parts(item, 'es')[at]!).sort().join())).map(item => item.id)
    expect(different).toEqual([])
    for (const item of items) for (const language of ['en', 'es'] as const) expect([item.id, item.feedback[language].split(/\s+/).length >= 7]).toEqual([item.id, true])
  })

  it('report how often the key is the longest answer', () => {
    const share = (language: Language) => choices.filter(item => isKeyLongest(item, language)).length / choices.length
    console.info(`${items.length} questions; the key is the longest answer in ${Math.round(share('en') * 100)} % (en) and ${Math.round(share('es') * 100)} % (es) of ${choices.length}`)
    expect(share('en')).toBeLessThan(0.4)
    expect(share('es')).toBeLessThan(0.4)
  })
})
