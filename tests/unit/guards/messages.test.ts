import { describe, expect, it } from 'vitest'
import { credentialColumns, peopleColumns } from '../../../server/services/imports/columns'
import { reasons } from '../../../server/services/imports/import-run'
import { filesBelow, readProjectFile } from '../../support/project-files'

type Messages = { [key: string]: string | Messages }

function flatten(messages: Messages, prefix = ''): Record<string, string> {
  return Object.assign({}, ...Object.entries(messages).map(([key, value]) => (typeof value === 'string' ? { [prefix + key]: value } : flatten(value, `${prefix}${key}.`))))
}
const load = (language: string, file: string) => flatten(JSON.parse(readProjectFile(`i18n/locales/${language}/${file}`)))
const files = filesBelow('i18n/locales/en', '.json')
const placeholders = (text: string) => [...new Set(text.match(/\{\w+\}/g) ?? [])].sort()

describe('messages', () => {
  it('stand in the same files in both languages', () => expect(filesBelow('i18n/locales/es', '.json')).toEqual(files))

  it.each(files)('%s has the same keys in English and Spanish, none of them empty', (file) => {
    const [english, spanish] = [load('en', file), load('es', file)]
    expect(Object.keys(spanish).sort()).toEqual(Object.keys(english).sort())
    expect(Object.entries({ ...english, ...spanish }).filter(([, text]) => text.trim() === '')).toEqual([])
  })

  it.each(files)('%s fills in the same values in both', (file) => {
    const [english, spanish] = [load('en', file), load('es', file)]
    const differing = Object.keys(english).filter(key => String(placeholders(english[key]!)) !== String(placeholders(spanish[key] ?? '')))
    expect(differing).toEqual([])
  })

  it('say ¡ALTO! and concreto, never ¡Pare!, hormigón or encofrado', () => {
    const spanish = files.flatMap(file => Object.entries(load('es', file)))
    expect(spanish.filter(([, text]) => /¡pare|hormig[oó]n|encofrado/i.test(text))).toEqual([])
  })

  it('use no key on a screen that no file has', () => {
    const known = new Set(files.flatMap(file => Object.keys(load('en', file))))
    const sources = ['pages', 'components', 'layouts', 'composables', 'stores'].flatMap(folder => filesBelow(folder).map(file => `${folder}/${file}`))
    const used = sources.flatMap(file => [...readProjectFile(file).matchAll(/(?<![\w.])\$?t\('([\w.]+)'/g)].map(match => `${file}: ${match[1]}`))
    expect(used.filter(use => !known.has(use.split(': ')[1]!))).toEqual([])
  })
  it('have words for every reason for which an import leaves a row out, and for every field', () => {
    const known = load('en', 'credentials.json')
    const needed = [...Object.keys(reasons).map(code => `imports.whys.${code}`), ...[...Object.keys(peopleColumns), ...Object.keys(credentialColumns), 'row'].map(field => `imports.fields.${field}`)]
    expect(needed.filter(key => !(key in known))).toEqual([])
  })
})
