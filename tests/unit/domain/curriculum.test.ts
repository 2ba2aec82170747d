import { describe, expect, it } from 'vitest'
import { blocksBelow, moduleBySlug, type ModuleProgress, modules, nextBlock, wallStates } from '#shared/domain/curriculum'

const written: ModuleProgress = { isWritten: true, hasChecklist: true, isStarted: false, isQuizPassed: false, isHeld: false }
const states = (progress: Record<string, Partial<ModuleProgress>>) =>
  wallStates(slug => progress[slug] ? { ...written, ...progress[slug] } : undefined)

describe('the training wall', () => {
  it('has 16 blocks in courses of 3, 2, 3, 2, 3, 2 and 1', () => {
    const counts = [1, 2, 3, 4, 5, 6, 7].map(course => modules.filter(module => module.course === course).length)
    expect(counts).toEqual([3, 2, 3, 2, 3, 2, 1])
    expect(new Set(modules.map(module => module.slug)).size).toBe(16)
  })

  it('shifts every course by half a block over the one below', () => {
    for (const module of modules.filter(one => one.course > 1)) {
      const below = modules.filter(other => other.course === module.course - 1)
      expect(below.every(other => Math.abs(other.left - module.left) % 2 === 1)).toBe(true)
    }
  })

  it.each([
    ['ready-for-site', []],
    ['footings-and-layout', ['ready-for-site', 'working-at-height']],
    ['tools-and-cutting', ['working-at-height', 'what-the-wall-is-made-of']],
    ['running-bond', ['footings-and-layout']],
    ['stacking', ['footings-and-layout', 'tools-and-cutting']],
    ['steel', ['tools-and-cutting']],
    ['openings', ['running-bond', 'stacking']],
    ['bracing-and-plumb', ['stacking', 'steel']],
    ['concrete-for-walls', ['openings']],
    ['before-the-pour', ['openings', 'bracing-and-plumb']],
    ['pump-and-hose', ['bracing-and-plumb']],
    ['pour-rate', ['concrete-for-walls', 'before-the-pour']],
    ['blowout-response', ['before-the-pour', 'pump-and-hose']],
    ['pour-lead', ['pour-rate', 'blowout-response']],
  ])('%s rests on the blocks it touches', (slug, expected) => {
    expect(moduleBySlug(slug)?.restsOn).toEqual(expected)
  })

  it('does not call a shared corner a touch', () => {
    const below = [{ slug: 'a', course: 1, left: 0 }, { slug: 'b', course: 1, left: 2 }]
    expect(blocksBelow({ course: 2, left: 2 }, below)).toEqual(['b'])
  })

  it('knows no module by another name', () => {
    expect(moduleBySlug('pouring')).toBeUndefined()
  })

  it('names every module in both languages, short enough for a block', () => {
    const long = modules.filter(({ title, shortTitle }) =>
      [title.en, title.es].some(text => text.trim() === '') || [shortTitle.en, shortTitle.es].some(text => text.length === 0 || text.length > 20))
    expect(long).toEqual([])
  })
})

describe('a block', () => {
  it('without content is unwritten and blocks nothing', () => {
    const wall = states({ stacking: {} })
    expect(wall.get('stacking')).toBe('open')
    expect(wall.get('footings-and-layout')).toBe('unwritten')
  })

  it('waits until the written ones below are laid', () => {
    expect(states({ 'footings-and-layout': {}, 'stacking': {} }).get('stacking')).toBe('waiting')
    expect(states({ 'footings-and-layout': { isQuizPassed: true }, 'stacking': {} }).get('stacking')).toBe('waiting')
    expect(states({ 'footings-and-layout': { isHeld: true }, 'stacking': {} }).get('stacking')).toBe('open')
    expect(states({ 'footings-and-layout': { isHeld: true }, 'tools-and-cutting': {}, 'stacking': {} }).get('stacking')).toBe('waiting')
  })

  it('is started by a lesson or a try, passed by the quiz, laid by the credential', () => {
    expect(states({ stacking: { isStarted: true } }).get('stacking')).toBe('started')
    expect(states({ stacking: { isStarted: true, isQuizPassed: true } }).get('stacking')).toBe('passed')
    expect(states({ stacking: { isStarted: true, isQuizPassed: true, isHeld: true } }).get('stacking')).toBe('laid')
  })

  it('without a checklist is laid by the quiz alone, and carries the next', () => {
    const wall = states({ stacking: { hasChecklist: false, isQuizPassed: true }, openings: {} })
    expect(wall.get('stacking')).toBe('laid')
    expect(wall.get('openings')).toBe('open')
  })

  it('whose ground has run out waits again, also when it was started', () => {
    expect(states({ 'footings-and-layout': {}, 'stacking': { isStarted: true } }).get('stacking')).toBe('waiting')
  })

  it('that is held is laid even where the module is not written', () => {
    expect(states({ steel: { isWritten: false, isHeld: true } }).get('steel')).toBe('laid')
  })
})

describe('the block to go on with', () => {
  it('is the first one started, then the first open one', () => {
    expect(nextBlock(states({ 'running-bond': {}, 'stacking': { isStarted: true } }))?.slug).toBe('stacking')
    expect(nextBlock(states({ 'running-bond': {}, 'stacking': {} }))?.slug).toBe('running-bond')
    expect(nextBlock(states({ stacking: { isHeld: true } }))).toBeNull()
  })
})
