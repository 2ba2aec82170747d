import { readdirSync, readFileSync } from 'node:fs'
import { join, resolve } from 'node:path'
import { parse } from 'yaml'
import type { Language } from '../../shared/domain/states'
import { toBank, toTeaching, type ModuleText, type Teaching } from '../../server/services/teaching'

const root = resolve(import.meta.dirname, '../..')
const banks = join(root, 'server/assets/quizzes')

function frontMatter(path: string): Record<string, unknown> {
  const [, text = ''] = readFileSync(path, 'utf8').split(/^---$/m)
  return parse(text) as Record<string, unknown>
}

const modulesOf = (language: Language) => readdirSync(join(root, 'content', language, 'modules'))

function lessonsOf(language: Language) {
  return modulesOf(language).flatMap((module) => {
    const folder = join(root, 'content', language, 'modules', module)
    return readdirSync(folder).filter(name => name !== 'index.md').map((name) => {
      const { title, minutes, order } = frontMatter(join(folder, name)) as { title: string, minutes: number, order: number }
      return { path: `/lessons/${module}/${name.replace(/^\d+\.|\.md$/g, '')}`, title, minutes, order }
    })
  })
}

const pagesOf = (language: Language) => modulesOf(language).map(module => ({
  path: `/modules/${module}`, ...(frontMatter(join(root, 'content', language, 'modules', module, 'index.md')) as unknown as ModuleText),
}))

/** The project's own banks, as their files hold them. */
export const readRealBanks = () => readdirSync(banks).map(name => toBank(parse(readFileSync(join(banks, name), 'utf8'))))

/** The project's own lessons and banks, read from their files. */
export const readRealTeaching = (): Teaching => toTeaching({
  modules: { en: pagesOf('en'), es: pagesOf('es') }, lessons: { en: lessonsOf('en'), es: lessonsOf('es') }, banks: readRealBanks(),
})
