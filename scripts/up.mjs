import { spawn } from 'node:child_process'
import { createServer } from 'node:net'
import { join, resolve } from 'node:path'
import { buildWhenStale, checkNode, installWhenStale, root, say } from './steps.mjs'

checkNode()
installWhenStale()
buildWhenStale()

const host = process.env.HOST || '127.0.0.1'
const port = Number(process.env.PORT || 3000)
const mailPort = Number(process.env.MAIL_PORT || 2525)
const textPort = Number(process.env.TEXT_PORT || 2526)

const isFree = (number, address) => new Promise((done) => {
  const probe = createServer()
  probe.once('error', () => done(false))
  probe.listen(number, address, () => probe.close(() => done(true)))
})

if (!await isFree(port, host)) {
  console.error(`Port ${port} is taken. Choose another: PORT=3001 npm run up`)
  process.exit(1)
}

const children = []
function start(args, env) {
  const child = spawn(process.execPath, args, { cwd: root, env: { ...process.env, ...env }, stdio: 'inherit' })
  children.push(child)
  return child
}
function stop(code) {
  for (const child of children) child.kill()
  process.exit(code)
}
process.on('SIGINT', () => stop(0))
process.on('SIGTERM', () => stop(0))

const env = { HOST: host, PORT: String(port), NODE_ENV: 'production', NUXT_DEMO: process.env.NUXT_DEMO ?? 'true', NUXT_DATABASE_PATH: process.env.NUXT_DATABASE_PATH || resolve(root, '.data/pourwright.sqlite') }
if (!process.env.NUXT_SMTP_URL) {
  if (await isFree(mailPort, '127.0.0.1')) start([join(root, 'scripts/mail-catcher.mjs')], { MAIL_PORT: String(mailPort), TEXT_PORT: String(textPort) })
  env.NUXT_TEXT_URL = process.env.NUXT_TEXT_URL || `http://127.0.0.1:${textPort}/`
  env.NUXT_SMTP_URL = `smtp://127.0.0.1:${mailPort}`
}
say('Starting: migrates, and fills an empty database with the demo company')
start([join(root, '.output/server/index.mjs')], env).on('exit', code => stop(code ?? 1))

const address = `http://${host === '0.0.0.0' ? 'localhost' : host}:${port}`
for (;;) {
  const answer = await fetch(`${address}/api/health`).catch(() => null)
  if (answer?.ok) break
  await new Promise(done => setTimeout(done, 200))
}
say(`Pourwright is at ${address}`)
if (env.NUXT_DEMO === 'true') {
  console.log(`
  Demo sign-ins (password: running-bond)
    safety@cedarhollow.example      safety manager
    office@cedarhollow.example      office admin
    foreman@cedarhollow.example     foreman
    super@cedarhollow.example       superintendent
    installer@cedarhollow.example   installer
  New hire, in Spanish: badge 2041, PIN 739416

  Mail that the product sends is caught here and kept in .data/mail. Ctrl+C ends it; the data stays in .data.
`)
}
