import { readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import { describe, expect, it } from 'vitest'
import { parse } from 'yaml'
import { readabilityOfAll, spanishSyllables } from '../../../scripts/readability'
import { filesBelow } from '../../support/project-files'

const root = resolve(import.meta.dirname, '../../..')
const words = parse(readFileSync(resolve(root, 'content/words.yaml'), 'utf8')) as { en: string, es: string, never?: string[] }[]
const spanish = [
  ...[['content/es', '.md'], ['i18n/locales/es', '.json'], ['server/assets', '.yaml'], ['components/drawing', '.vue']].flatMap(([folder, ending]) => filesBelow(folder!, ending).map(path => `${folder}/${path}`)),
].map(path => ({ path, text: readFileSync(resolve(root, path), 'utf8') }))

describe('the words', () => {
  it('that mislead on US sites stand in no Spanish text', () => {
    const never = words.flatMap(word => word.never ?? [])
    const found = spanish.flatMap(({ path, text }) => never.filter(word => new RegExp(`(?<!\\p{L})${word}(?!\\p{L})`, 'iu').test(path.includes('ready-for-site') || path.includes('pour-rate') ? text.replaceAll('¡Pare!', '') : text)).map(word => `${path}: ${word}`))
    expect(found).toEqual([])
  })

  it('of the list are the ones that lessons and screens use', () => {
    const all = spanish.map(({ text }) => text.toLowerCase()).join('\n')
    expect(words.filter(word => !all.includes(word.es.toLowerCase())).map(word => word.es)).toEqual([])
  })
})

describe('how hard it is to read', () => {
  it('stays at or below US grade 7 in every English lesson and talk (Flesch-Kincaid)', () => {
    expect(readabilityOfAll('en').filter(({ figure }) => figure > 7)).toEqual([])
  })

  it('stays at "fairly easy" or easier in every Spanish lesson and talk (Fernández Huerta, 70 and more)', () => {
    expect(readabilityOfAll('es').filter(({ figure }) => figure < 70)).toEqual([])
  })

  it.each([['concreto', 3], ['presión', 2], ['guía', 2], ['oído', 3], ['ciudad', 2], ['línea', 3], ['que', 1], ['y', 1], ['reventón', 3]])('counts the syllables of %s as %s', (word, count) => {
    expect(spanishSyllables(word)).toBe(count)
  })
})
