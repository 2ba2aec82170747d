import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { buildWhenStale, checkNode, installProgramsWhenMissing, installWhenStale, root, run, say } from './steps.mjs'

checkNode()
installWhenStale()
installProgramsWhenMissing()
const startedAt = Date.now()

const folder = join(root, '.check')
rmSync(folder, { recursive: true, force: true })
mkdirSync(folder)

let passed = 0
let failed = 0
function test(name, args, env = {}) {
  say(`Tests: ${name}`)
  const file = join(folder, `${name.replace(/\W+/g, '-')}.json`)
  const isGood = run('vitest', ['run', ...args, '--reporter=default', '--reporter=json', `--outputFile.json=${file}`], env)
  const counts = existsSync(file) ? JSON.parse(readFileSync(file, 'utf8')) : { numPassedTests: 0, numFailedTests: 0 }
  passed += counts.numPassedTests
  failed += isGood ? counts.numFailedTests : Math.max(1, counts.numFailedTests)
}
function step(name, isGood) {
  if (isGood) return
  console.error(`\n${name} failed.`)
  console.log(`\n${passed} passed, ${failed + 1} failed`)
  process.exit(1)
}

step('Preparing', run('nuxt', ['prepare', '--logLevel', 'silent']))
say('Lint')
step('Lint', run('eslint', ['.', '--max-warnings', '0']))
say('Types')
step('Types', run('nuxt', ['typecheck']))
buildWhenStale()
test('everything, in UTC', [], { TZ: 'UTC' })
test('rules in New York', ['--project', 'unit'], { TZ: 'America/New_York' })
test('rules in Tokyo', ['--project', 'unit'], { TZ: 'Asia/Tokyo' })

say(`Lint, types and tests took ${Math.round((Date.now() - startedAt) / 1000)} s`)
console.log(`\n${passed} passed, ${failed} failed`)
process.exit(failed > 0 ? 1 : 0)
