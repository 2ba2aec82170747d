import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { canonicalSheet, hashInput } from '#shared/domain/sheet'

describe('RFC 8785 (JSON Canonicalization Scheme)', () => {
  it('sorts fields by UTF-16 units, not as numbers', () => {
    expect(canonicalSheet(JSON.parse('[56,{"d":true,"10":null,"1":[]}]'))).toBe('[56,{"1":[],"10":null,"d":true}]')
  })

  it.each([
    ['333333333.33333329', '333333333.3333333'], ['1E30', '1e+30'], ['2e-3', '0.002'], ['4.50', '4.5'], ['-0', '0'],
    ['0.000000000000000000000000001', '1e-27'],
  ])('writes %s as %s', (text, expected) => {
    expect(canonicalSheet(JSON.parse(text))).toBe(expected)
  })

  it('escapes control characters only, as in section 3.2.2.2', () => {
    expect(canonicalSheet('\u20AC$\u000F\u000AA\'\u0042\u0022\u005C\\"/')).toBe('"€$\\u000f\\nA\'B\\"\\\\\\\\\\"/"')
  })

  it('sorts the sample keys of section 3.2.3', () => {
    const sample = { '\u20AC': 'Euro Sign', '\r': 'Carriage Return', '\uFB33': 'Hebrew', '1': 'One', '\uD83D\uDE00': 'Emoji', '\u0080': 'Control', '\u00F6': 'o diaeresis' }
    expect(canonicalSheet(sample).match(/:"([^"]+)"/g)?.map(part => part.slice(2, -1)))
      .toEqual(['Carriage Return', 'One', 'Control', 'o diaeresis', 'Euro Sign', 'Emoji', 'Hebrew'])
  })
})

describe('SHA-256 (FIPS 180-4) of a hashed text', () => {
  it('is that of the same bytes written out by hand', () => {
    const byHand = '{"previousHash":null,"sheet":{"count":1,"name":"Ñ"}}'
    const digest = (text: string) => createHash('sha256').update(Buffer.from(text, 'utf8')).digest('hex')
    expect(digest('abc')).toBe('ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad')
    expect(digest(hashInput({ sheet: { name: 'Ñ', count: 1 }, previousHash: null }))).toBe(digest(byHand))
  })
})
