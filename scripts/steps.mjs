import { execFileSync, spawnSync } from 'node:child_process'
import { existsSync, readdirSync, statSync } from 'node:fs'
import { dirname, join, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'

/** The project's folder, wherever it was called from. */
export const root = resolve(dirname(fileURLToPath(import.meta.url)), '..')

/** What a build is made from; a newer file among these asks for a new build. */
const sources = ['app.vue', 'error.vue', 'assets', 'components', 'composables', 'content', 'content.config.ts', 'i18n', 'layouts', 'middleware', 'migrations', 'modules', 'nuxt.config.ts', 'package-lock.json', 'pages', 'plugins', 'public', 'seeds', 'server', 'shared', 'stores', 'tailwind.config.ts']

function newest(path) {
  if (!existsSync(path)) return 0
  const stat = statSync(path)
  if (!stat.isDirectory()) return stat.mtimeMs
  return Math.max(stat.mtimeMs, ...readdirSync(path).map(name => newest(join(path, name))))
}

const ageOf = path => (existsSync(path) ? statSync(path).mtimeMs : 0)

/** Says a line to the person at the terminal. */
export const say = line => console.log(`\n› ${line}`)

/** Stops with words when this Node can't run the product. */
export function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number)
  if (major < 20 || (major === 20 && minor < 19)) {
    console.error(`Pourwright needs Node 20.19 or later; this is ${process.versions.node}.`)
    process.exit(1)
  }
}

/** Installs the locked packages when they are missing or older than the lock. */
export function installWhenStale() {
  if (ageOf(join(root, 'node_modules/.package-lock.json')) >= ageOf(join(root, 'package-lock.json'))) return
  say('Installing packages (about two minutes the first time)')
  execFileSync('npm', ['ci', '--no-audit', '--no-fund', '--loglevel=error'], { cwd: root, stdio: 'inherit' })
}

/** The environment for a build: a test runner's marks change what is built. */
function buildEnvironment() {
  return Object.fromEntries(Object.entries(process.env).filter(([name]) => !['VITEST', 'TEST', 'NODE_ENV'].includes(name) && !name.startsWith('VITEST_')))
}

/** Builds when a source is newer than the last build. Throws when the build fails. */
export function buildWhenStale() {
  if (ageOf(join(root, '.output/server/index.mjs')) > Math.max(...sources.map(source => newest(join(root, source))))) return
  say('Building (about half a minute)')
  execFileSync(process.execPath, [join(root, 'node_modules/nuxt/bin/nuxt.mjs'), 'build', '--logLevel', 'silent'], { cwd: root, env: buildEnvironment(), stdio: ['ignore', 'inherit', 'inherit'] })
}

/** Programs of the machine that the tests use, with the Debian packages that hold them. */
const programs = [
  { package: 'chromium', paths: [process.env.CHROMIUM_PATH, '/usr/bin/chromium', '/usr/bin/google-chrome'], why: 'browser tests' },
  { package: 'poppler-utils', paths: ['/usr/bin/pdftoppm'], why: 'looking at the PDFs' },
]

/** Installs what the tests need of the machine, when root on Debian; otherwise stops and names what to install. */
export function installProgramsWhenMissing() {
  const missing = programs.filter(program => !program.paths.some(path => path && existsSync(path)))
  if (missing.length === 0) return
  const names = missing.map(program => program.package)
  if (process.getuid?.() !== 0 || !existsSync('/usr/bin/apt-get')) {
    console.error(`Missing for the tests: ${missing.map(program => `${program.package} (${program.why})`).join(', ')}.\nInstall with: sudo apt-get install ${names.join(' ')}   (or set CHROMIUM_PATH to a Chromium you have)`)
    process.exit(1)
  }
  say(`Installing ${names.join(' and ')}`)
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' }
  execFileSync('apt-get', ['update', '-qq'], { env, stdio: 'inherit' })
  execFileSync('apt-get', ['install', '-y', '-qq', '--no-install-recommends', ...names], { env, stdio: ['ignore', 'ignore', 'inherit'] })
}

/** Runs one of the project's programs; true when it ended well. */
export function run(program, args, env = {}) {
  return spawnSync(join(root, 'node_modules/.bin', program), args, { cwd: root, env: { ...process.env, ...env }, stdio: 'inherit' }).status === 0
}
