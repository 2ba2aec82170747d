import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import fc from 'fast-check'
import { canonicalSheet, firstBrokenLink, hashInput } from '#shared/domain/sheet'

const sha256 = (text: string) => createHash('sha256').update(text, 'utf8').digest('hex')

function aChain(...sheets: unknown[]) {
  const chain: { previousHash: string | null, sheet: unknown, hash: string }[] = []
  for (const sheet of sheets) {
    const previousHash = chain.at(-1)?.hash ?? null
    chain.push({ previousHash, sheet, hash: sha256(hashInput({ previousHash, sheet })) })
  }
  return chain
}

describe('the canonical form', () => {
  it('does not depend on the order in which fields were written', () => {
    expect(canonicalSheet({ b: 1, a: [{ d: null, c: 'ñ' }] })).toBe('{"a":[{"c":"ñ","d":null}],"b":1}')
  })

  it('leaves out fields that are undefined, as stored JSON does', () => {
    expect(canonicalSheet({ a: undefined, b: 1 })).toBe('{"b":1}')
  })

  it.each<[string, unknown]>([
    ['a lone high surrogate', { name: 'A\uD83D' }], ['a lone low surrogate', ['\uDE00']], ['a lone surrogate in a key', { ['\uD800']: 1 }],
    ['not a number', { a: Number.NaN }], ['infinity', [Number.POSITIVE_INFINITY]], ['a big integer', { a: 1n }], ['a function', { a: () => 1 }],
    ['undefined in a list', [undefined]], ['a hole in a list', Array(1)], ['undefined alone', undefined], ['a date object', { at: new Date(0) }], ['a map', new Map()],
  ])('refuses %s', (_what, value) => {
    expect(() => canonicalSheet(value)).toThrow(TypeError)
  })

  it('names the place of what it refuses', () => {
    expect(() => canonicalSheet({ lines: [{ name: 'ok' }, { name: '\uD800' }] })).toThrow('$.lines[1].name')
  })

  it('keeps whole characters outside the basic plane', () => {
    expect(canonicalSheet({ name: '👷 Ñandú' })).toBe('{"name":"👷 Ñandú"}')
  })

  it('of any JSON value reads back as that value, and is its own canonical form', () => {
    fc.assert(fc.property(fc.jsonValue({ noUnicodeString: false }), (value) => {
      const text = canonicalSheet(value)
      expect(canonicalSheet(JSON.parse(text))).toBe(text)
      expect(JSON.stringify(JSON.parse(text))).toHaveLength(JSON.stringify(value).length)
    }))
  })
})

describe('the hashed text', () => {
  it('is the canonical form of the previous hash and the sheet', () => {
    expect(hashInput({ previousHash: null, sheet: { b: 2, a: 1 } })).toBe('{"previousHash":null,"sheet":{"a":1,"b":2}}')
  })
})

describe('a chain of sheets', () => {
  const sheets = [{ date: '2026-11-30', count: 9 }, { date: '2026-12-01', count: 11 }, { kind: 'addendum', text: 'late' }]

  it('holds as it was sealed, and when it is empty', () => {
    expect(firstBrokenLink(aChain(...sheets), sha256)).toBeNull()
    expect(firstBrokenLink([], sha256)).toBeNull()
  })

  it('breaks where a sheet was edited', () => {
    const edited = aChain(...sheets).map((link, index) => index === 1 ? { ...link, sheet: { date: '2026-12-01', count: 12 } } : link)
    expect(firstBrokenLink(edited, sha256)).toBe(1)
  })

  it('breaks after an edited sheet whose hash was made to fit', () => {
    const [first, second, third] = aChain(...sheets)
    if (!first || !second || !third) throw new Error('three links are needed')
    const forged = { ...second, sheet: { count: 12 }, hash: sha256(hashInput({ previousHash: second.previousHash, sheet: { count: 12 } })) }
    expect(firstBrokenLink([first, forged, third], sha256)).toBe(2)
  })

  it('breaks where a sheet was taken out or the head was cut off', () => {
    const chain = aChain(...sheets)
    expect(firstBrokenLink(chain.filter((_, index) => index !== 1), sha256)).toBe(1)
    expect(firstBrokenLink(chain.slice(1), sha256)).toBe(0)
  })
})
