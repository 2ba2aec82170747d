import { spawn, type ChildProcess } from 'node:child_process'
import { mkdtempSync } from 'node:fs'
import { createServer } from 'node:net'
import { tmpdir } from 'node:os'
import { join, resolve } from 'node:path'

export interface RunningServer {
  origin: string
  /** The folder that holds its database, files and key. */
  folder: string
  databasePath: string
  process: ChildProcess
  /** Everything that it printed so far. */
  log: () => string
  /** Asks it to end and waits; with SIGKILL it gets no chance to tidy up. */
  stop: (signal?: NodeJS.Signals) => Promise<void>
}

const entry = resolve(import.meta.dirname, '../../.output/server/index.mjs')

/** A port that nothing listens on. */
export function freePort(): Promise<number> {
  return new Promise((done, fail) => {
    const probe = createServer()
    probe.once('error', fail)
    probe.listen(0, '127.0.0.1', () => {
      const address = probe.address()
      probe.close(() => (address && typeof address === 'object' ? done(address.port) : fail(new Error('no port'))))
    })
  })
}

/** Starts the built server on a free port and waits until it answers. `folder` lets a test start it again on the same data. */
export async function startServer(options: { env?: Record<string, string>, folder?: string, port?: number } = {}): Promise<RunningServer> {
  const folder = options.folder ?? mkdtempSync(join(tmpdir(), 'pourwright-test-'))
  const port = options.port ?? await freePort()
  const origin = `http://127.0.0.1:${port}`
  const databasePath = join(folder, 'pourwright.sqlite')
  const child = spawn(process.execPath, [entry], {
    cwd: folder,
    env: { PATH: process.env.PATH, TZ: process.env.TZ, NODE_ENV: 'production', HOST: '127.0.0.1', PORT: String(port), NUXT_DATABASE_PATH: databasePath, ...options.env },
    stdio: ['ignore', 'pipe', 'pipe'],
  })
  let printed = ''
  child.stdout!.on('data', (chunk: Buffer) => printed += chunk.toString())
  child.stderr!.on('data', (chunk: Buffer) => printed += chunk.toString())
  const ended = new Promise<void>(done => child.once('exit', () => done()))
  const stop = async (signal: NodeJS.Signals = 'SIGTERM') => {
    child.kill(signal)
    await ended
  }
  const deadline = Date.now() + 40_000
  for (;;) {
    const answer = await fetch(`${origin}/api/health`).catch(() => null)
    if (answer?.ok) return { origin, folder, databasePath, process: child, log: () => printed, stop }
    if (child.exitCode !== null || Date.now() > deadline) throw new Error(`The server did not start:\n${printed}`)
    await new Promise(done => setTimeout(done, 50))
  }
}
