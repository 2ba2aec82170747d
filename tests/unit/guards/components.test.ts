import { describe, expect, it } from 'vitest'
import { filesBelow, readProjectFile } from '../../support/project-files'

/** What templates may use without an import: Nuxt's own list, written when the project is prepared. */
const known = new Set([...readProjectFile('.nuxt/components.d.ts').matchAll(/^\s*(?:export const )?['"]?(\w+)['"]?:/gm)].map(match => match[1]))
const builtIn = new Set(['Suspense', 'Teleport', 'Transition', 'TransitionGroup', 'KeepAlive', 'Component'])
const files = ['components', 'pages', 'layouts'].flatMap(folder => filesBelow(folder, '.vue').map(file => `${folder}/${file}`))

describe('components', () => {
  it('are known to Nuxt', () => expect(known.has('BaseButton')).toBe(true))

  it.each([...files, 'app.vue', 'error.vue'])('%s uses none that does not exist: an unknown tag would show nothing and say nothing', (file) => {
    const source = readProjectFile(file)
    const imported = new Set([...source.matchAll(/(?:import |const )(\w+)/g)].map(match => match[1]))
    const template = source.slice(source.indexOf('<template'))
    const used = [...template.matchAll(/<([A-Z]\w+)/g)].map(match => match[1]!)
    expect([...new Set(used)].filter(name => !known.has(name) && !imported.has(name) && !builtIn.has(name))).toEqual([])
  })
})
