import { execFileSync } from 'node:child_process'
import { existsSync, readdirSync, statSync } from 'node:fs'
import { join, resolve } from 'node:path'
import type { TestProject } from 'vitest/node'
import { startServer } from './server'

const root = resolve(import.meta.dirname, '../..')
const sources = ['app.vue', 'error.vue', 'assets', 'components', 'composables', 'content', 'content.config.ts', 'i18n', 'layouts', 'middleware', 'migrations', 'modules', 'nuxt.config.ts', 'package-lock.json', 'pages', 'plugins', 'public', 'seeds', 'server', 'shared', 'stores', 'tailwind.config.ts']

function newest(path: string): number {
  if (!existsSync(path)) return 0
  const stat = statSync(path)
  if (!stat.isDirectory()) return stat.mtimeMs
  return Math.max(stat.mtimeMs, ...readdirSync(path).map(name => newest(join(path, name))))
}

/** Builds when a source is newer than the build. */
export function buildWhenStale(): void {
  const built = join(root, '.output/server/index.mjs')
  const age = existsSync(built) ? statSync(built).mtimeMs : 0
  if (age > Math.max(...sources.map(source => newest(join(root, source))))) return
  const env = Object.fromEntries(Object.entries(process.env).filter(([name]) => !['VITEST', 'TEST', 'NODE_ENV'].includes(name) && !name.startsWith('VITEST_')))
  execFileSync(process.execPath, [join(root, 'node_modules/nuxt/bin/nuxt.mjs'), 'build'], { cwd: root, env, stdio: ['ignore', 'ignore', 'inherit'] })
}

declare module 'vitest' {
  interface ProvidedContext { origin: string, databasePath: string }
}

/** Builds once and serves the demo company to every test of the project, at a fixed instant (Tuesday morning in Denver). */
export default async function setup(project: TestProject) {
  buildWhenStale()
  const server = await startServer({ env: { NUXT_DEMO: 'true', NUXT_CLOCK: '2026-12-01T13:30:00Z' } })
  project.provide('origin', server.origin)
  project.provide('databasePath', server.databasePath)
  return () => server.stop()
}
