import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { parse } from 'yaml'
import type { Language } from '../../shared/domain/states'

const root = resolve(import.meta.dirname, '../..')

/** One Markdown file of the content with its front matter. */
export interface ContentFile { path: string, front: Record<string, unknown>, body: string }

/** Reads a file below `content/`. */
export function readContent(path: string): ContentFile {
  const text = readFileSync(join(root, 'content', path), 'utf8')
  const end = text.indexOf('\n---\n', 4)
  return { path, front: parse(text.slice(4, end)) as Record<string, unknown>, body: text.slice(end + 5) }
}

/** The names of the files or folders of one place below `content/`, sorted. */
export const listContent = (place: string) => readdirSync(join(root, 'content', place)).sort()

/** The lessons of a module in a language, in their order. */
export const lessonsOf = (language: Language, module: string) => listContent(`${language}/modules/${module}`).filter(name => name !== 'index.md').map(name => readContent(`${language}/modules/${module}/${name}`))

/** The file of a drawing by the name that texts use, or undefined. */
export function drawingFile(name: string): string | undefined {
  const file = join(root, 'components/drawing', `${name.split('-').map(part => part.charAt(0).toUpperCase() + part.slice(1)).join('')}.vue`)
  return existsSync(file) ? readFileSync(file, 'utf8') : undefined
}

/** The names of the drawings that a text shows. */
export const drawingsIn = (body: string) => [...body.matchAll(/::lesson-drawing\{name="([^"]+)"\}/g)].map(match => match[1]!)

/** The pieces to try that a text shows. */
export const piecesIn = (body: string) => [...body.matchAll(/^::(try-[a-z-]+)/gm)].map(match => match[1]!)

/** Every number as it is written, with the unit that follows it, in the order of the text. Ordered-list marks are left out. */
export function numbersIn(text: string): string[] {
  const plain = text.replace(/^\s*\d+\.\s/gm, '').replace(/(\d),(\d{3})/g, '$1$2')
  return [...plain.matchAll(/\d+(?:[./]\d+)*(?:\s\d+\/\d+)?(?:\s?(?:lb\/ft²|lb\/ft³|lb\/in²|yd³|ft²|°F|mph|psi|ft|in|lb|kV|%))?(?![\p{L}\d])/gu)].map(match => match[0].replace(/\s/g, ' '))
}

/** What a number that could be acted on stands beside: where it comes from. */
export const hasSource = /\b(CFR|IRC|ACI|ASTM|UFGS|CCR|OSHA|practice|práctica|source|fuente|memory|memoria|computed|calculado|guidance|guía|maker|fabricante|pour card|tarjeta de colado|Weather Service|Servicio Meteorológico|trade journal|safety data|hoja de seguridad|chart|tabla)\b/i
