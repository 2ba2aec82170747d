import { readdirSync, readFileSync } from 'node:fs'
import { join, relative, resolve } from 'node:path'

export const projectRoot = resolve(import.meta.dirname, '../..')

/** Every file below a folder of the project, as paths relative to that folder. */
export function filesBelow(folder: string, ending = ''): string[] {
  const root = join(projectRoot, folder)
  return readdirSync(root, { recursive: true, withFileTypes: true })
    .filter(entry => entry.isFile() && entry.name.endsWith(ending))
    .map(entry => relative(root, join(entry.parentPath, entry.name)))
    .sort()
}

export const readProjectFile = (path: string) => readFileSync(join(projectRoot, path), 'utf8')
