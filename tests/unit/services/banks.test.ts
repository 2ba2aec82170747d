import { describe, expect, it } from 'vitest'
import { drawAttempt } from '#shared/domain/drawing-of-items'
import { toBank } from '~~/server/services/teaching'
import { readRealBanks, readRealTeaching } from '../../support/teaching'

const teaching = readRealTeaching()

describe.each(readRealBanks())('the bank of $module', (bank) => {
  it('has at least 20 items of all five kinds, with must-know items among them', () => {
    expect(bank.items.length).toBeGreaterThanOrEqual(20)
    expect(new Set(bank.items.map(item => item.kind))).toEqual(new Set(['one', 'all', 'order', 'number', 'place']))
    expect(bank.items.some(item => item.mustKnow)).toBe(true)
    expect(new Set(bank.items.map(item => item.id)).size).toBe(bank.items.length)
  })

  it('points every item at a lesson that exists', () => {
    const lessons = teaching.get(bank.module)!.lessons.map(lesson => lesson.slug)
    expect(bank.items.map(item => item.lesson).filter(lesson => !lessons.includes(lesson))).toEqual([])
  })

  it('draws at least one item from every lesson', () => {
    const lessonOf = new Map(bank.items.map(item => [item.id, item.lesson]))
    const drawn = drawAttempt(bank, 'any seed').map(item => lessonOf.get(item.id))
    expect(new Set(drawn)).toEqual(new Set(bank.items.map(item => item.lesson)))
  })
})

describe('a bank that is not sound', () => {
  const [sound] = readRealBanks()
  const [first, ...rest] = sound!.items

  it('is refused when a key points at no option', () => {
    expect(() => toBank({ ...sound, items: [{ ...first, key: 'z' }, ...rest] })).toThrow(/keys that don't fit/)
  })

  it('is refused when a language is missing', () => {
    expect(() => toBank({ ...sound, items: [{ ...first, feedback: { en: 'Only English' } }, ...rest] })).toThrow()
  })
})
