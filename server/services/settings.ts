import { dirname, join, resolve } from 'node:path'
import { createClock, type Clock } from './clock'

/** Everything that the environment decides, read once at start. Paths are absolute. */
export interface Settings {
  databasePath: string
  filesPath: string
  signingKeyPath: string
  signingKey: string
  clock: Clock
  isDemo: boolean
  /** The address people use, without a slash at the end; empty: taken from each request. */
  origin: string
  /** Where links in mail lead: `origin`, or the address this process listens on. Never taken from a request, which could name any host. */
  linkOrigin: string
  hasTls: boolean
  smtpUrl: string
  /** Where text messages are posted; empty: none go out. */
  textUrl: string
  mailFrom: string
  setupToken: string
}

/** Text gateways came later than the rest: what calls without one means none. */
type Raw = { textUrl?: unknown } & Record<'databasePath' | 'filesPath' | 'signingKeyPath' | 'signingKey' | 'clock' | 'demo' | 'origin' | 'tls' | 'smtpUrl' | 'mailFrom' | 'setupToken', unknown>

/** `http://host:port` as the server was told to listen; localhost when it listens everywhere. */
function listeningOrigin(): string {
  const host = process.env.NITRO_HOST || process.env.HOST || ''
  const isEverywhere = ['', '0.0.0.0', '::', '[::]'].includes(host)
  return `http://${isEverywhere ? 'localhost' : host}:${process.env.NITRO_PORT || process.env.PORT || 3000}`
}

const isOn = (value: unknown) => value === true || value === 1 || ['true', '1', 'yes', 'on'].includes(String(value).toLowerCase())

/** Reads the runtime configuration; paths left empty stand beside the database. Throws when `NUXT_CLOCK` is not an instant. */
export function toSettings(raw: Raw): Settings {
  const text = (key: keyof Raw) => (raw[key] === undefined || raw[key] === null ? '' : String(raw[key]).trim())
  const databasePath = resolve(text('databasePath') || '.data/pourwright.sqlite')
  const beside = (name: string) => join(dirname(databasePath), name)
  return {
    databasePath,
    filesPath: text('filesPath') ? resolve(text('filesPath')) : beside('files'),
    signingKeyPath: text('signingKeyPath') ? resolve(text('signingKeyPath')) : beside('signing-key.pem'),
    signingKey: text('signingKey'),
    clock: createClock(text('clock')),
    isDemo: isOn(raw.demo),
    origin: text('origin').replace(/\/+$/, ''),
    linkOrigin: text('origin').replace(/\/+$/, '') || listeningOrigin(),
    hasTls: isOn(raw.tls),
    smtpUrl: text('smtpUrl'),
    textUrl: text('textUrl'),
    mailFrom: text('mailFrom'),
    setupToken: text('setupToken'),
  }
}
