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
  hasTls: boolean
  smtpUrl: string
  mailFrom: string
  setupToken: string
}

type Raw = Record<'databasePath' | 'filesPath' | 'signingKeyPath' | 'signingKey' | 'clock' | 'demo' | 'origin' | 'tls' | 'smtpUrl' | 'mailFrom' | 'setupToken', unknown>

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
    hasTls: isOn(raw.tls),
    smtpUrl: text('smtpUrl'),
    mailFrom: text('mailFrom'),
    setupToken: text('setupToken'),
  }
}
