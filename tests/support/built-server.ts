import type { TestProject } from 'vitest/node'
import { buildWhenStale } from '../../scripts/steps.mjs'
import { startServer } from './server'

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
