import { expect, it } from 'vitest'
import { markdownOf } from '#shared/domain/markdown-of-talk'

it('writes a shipped talk as Markdown: headings, numbered points with a bold lead, a caution as a quotation', () => {
  expect(markdownOf([
    ['h2', { id: 'ask-first' }, 'Ask first'], ['p', {}, 'Who ', ['em', {}, 'knows'], '?'],
    ['ol', {}, ['li', {}, ['strong', {}, 'Air.'], ' It whips.'], ['li', {}, 'Two']], ['lesson-caution', {}, ['p', {}, 'Stay off.']], ['ul', {}, ['li', {}, 'Look up']],
  ])).toBe('## Ask first\n\nWho *knows*?\n\n1. **Air.** It whips.\n2. Two\n\n> Stay off.\n\n- Look up')
})
