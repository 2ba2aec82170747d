import { readdirSync, readFileSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { pathToFileURL } from 'node:url'
import { fleschKincaid } from 'flesch-kincaid'
import { syllable } from 'syllable'

/*
 * How hard lessons and talks are to read, by published formulas.
 * English: Flesch-Kincaid grade level (Kincaid and others, 1975): 0.39 words a sentence + 11.8 syllables a word - 15.59.
 * Spanish: Fernández Huerta (1959), as corrected: 206.84 - 60 syllables a word - 1.02 words a sentence; 70 and more
 * is "fairly easy", 80 and more "easy".
 * Run: npm run readability
 */

const root = resolve(import.meta.dirname, '..')

/** Syllables of a Spanish word: each strong vowel, stressed weak vowel, or group of weak ones around a strong one, counts once. */
export function spanishSyllables(word: string): number {
  const letters = word.toLowerCase().replace(/qu|gu(?=[eiéí])/g, 'k').replace(/y(?![aeiouáéíóúü])/g, 'i')
  let count = 0
  let before = ''
  for (const letter of letters) {
    const isStrong = 'aeoáéó'.includes(letter)
    const isStressedWeak = 'íú'.includes(letter)
    const isVowel = isStrong || isStressedWeak || 'iuü'.includes(letter)
    if (isVowel && (before === '' || isStressedWeak || (isStrong && 'aeoáéóíú'.includes(before)) || (!isStrong && 'íú'.includes(before)))) count++
    before = isVowel ? letter : ''
  }
  return Math.max(1, count)
}

/** The words that are read: no front matter, components, sources in brackets, or marks; a list item or heading ends a sentence. */
export function toSentences(markdown: string): string[] {
  const body = markdown.replace(/^---[\s\S]*?\n---\n/, '').replace(/^::[^\n]*$/gm, '').replace(/\([^()]*\)/g, '').replace(/\*\*|`|\[|\]/g, '')
  return body.split('\n').flatMap(line => line.replace(/^\s*(?:#+|[-*]|\d+\.)\s*/, '').split(/(?<=[.!?:;])\s+(?=\p{Lu}|¿|¡|"|\d)/u)).map(one => one.trim()).filter(one => /\p{L}{2,}/u.test(one))
}

const wordsOf = (sentence: string) => sentence.match(/\p{L}[\p{L}'’-]*/gu) ?? []

/** The figure of one text: English as US school grade, lower is easier; Spanish as ease from 0 to 100, higher is easier. */
export function readability(markdown: string, language: 'en' | 'es'): number {
  const sentences = toSentences(markdown)
  const words = sentences.flatMap(wordsOf)
  if (language === 'en') return fleschKincaid({ sentence: sentences.length, word: words.length, syllable: words.reduce((sum, word) => sum + syllable(word), 0) })
  const syllables = words.reduce((sum, word) => sum + spanishSyllables(word), 0)
  return 206.84 - 60 * syllables / words.length - 1.02 * words.length / sentences.length
}

const filesBelow = (folder: string): string[] => readdirSync(folder, { withFileTypes: true }).flatMap(entry => entry.isDirectory() ? filesBelow(join(folder, entry.name)) : entry.name.endsWith('.md') ? [join(folder, entry.name)] : [])

/** Every lesson and talk with its figure, the hardest first. */
export function readabilityOfAll(language: 'en' | 'es'): { file: string, figure: number }[] {
  return ['modules', 'talks'].flatMap(kind => filesBelow(join(root, 'content', language, kind))).filter(path => !path.endsWith('index.md'))
    .map(path => ({ file: path.slice(root.length + 1), figure: readability(readFileSync(path, 'utf8'), language) }))
    .sort((first, second) => (language === 'en' ? second.figure - first.figure : first.figure - second.figure))
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  for (const [language, name] of [['en', 'Flesch-Kincaid grade (lower is easier)'], ['es', 'Fernández Huerta ease (higher is easier)']] as const) {
    const all = readabilityOfAll(language)
    const mean = all.reduce((sum, one) => sum + one.figure, 0) / all.length
    console.log(`\n${name}: ${all.length} texts, mean ${mean.toFixed(1)}`)
    for (const { file, figure } of all) console.log(`${figure.toFixed(1).padStart(6)}  ${file}`)
  }
}
