import { createHash, createPrivateKey, createPublicKey, generateKeyPairSync, sign, verify, type KeyObject } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { dirname } from 'node:path'
import type { PublicJwk } from '#shared/domain/recheck'
import type { Settings } from './settings'

/** The company's Ed25519 key (RFC 8032), and the earlier ones that its old signatures are still checked with. */
export interface SigningKey {
  /** The JWK thumbprint (RFC 7638) of the public key; stored beside each signature. */
  keyId: string
  privateKey: KeyObject
  publicKey: KeyObject
  /** By key id, the present one included. */
  known: ReadonlyMap<string, KeyObject>
}

const keys = new WeakMap<Settings, SigningKey>()

/** The public half as JWK (RFC 8037). */
export function publicJwkOf(publicKey: KeyObject): PublicJwk {
  const { crv = '', kty = '', x = '' } = publicKey.export({ format: 'jwk' })
  return { crv, kty, x }
}

/** RFC 7638 over the required members of an OKP key (RFC 8037), base64url. */
function thumbprint(publicKey: KeyObject): string {
  return createHash('sha256').update(JSON.stringify(publicJwkOf(publicKey))).digest('base64url')
}

function readPem(pem: string): SigningKey {
  const blocks = pem.replaceAll('\\n', '\n').match(/-----BEGIN [A-Z ]+-----[\s\S]+?-----END [A-Z ]+-----/g) ?? []
  const present = blocks.find(block => block.includes('PRIVATE KEY'))
  if (!present) throw new Error('The signing key holds no private key in PEM form')
  const privateKey = createPrivateKey(present)
  if (privateKey.asymmetricKeyType !== 'ed25519') throw new Error(`The signing key must be Ed25519, not ${privateKey.asymmetricKeyType}`)
  const publicKeys = blocks.map(block => createPublicKey(block))
  const publicKey = createPublicKey(privateKey)
  return { keyId: thumbprint(publicKey), privateKey, publicKey, known: new Map(publicKeys.map(key => [thumbprint(key), key])) }
}

/** Makes the key file at the first start, readable by its owner only. Two processes that start at once agree on one. */
function ensureKeyFile(path: string): void {
  if (existsSync(path)) return
  mkdirSync(dirname(path), { recursive: true })
  const pem = generateKeyPairSync('ed25519').privateKey.export({ type: 'pkcs8', format: 'pem' })
  try {
    writeFileSync(path, pem, { mode: 0o600, flag: 'wx' })
  }
  catch (error) {
    if (!(error instanceof Error && 'code' in error && error.code === 'EEXIST')) throw error
  }
}

/**
 * The key that seals sheets and cards. It stands apart from the database: in `NUXT_SIGNING_KEY` (PEM) or in the
 * file `NUXT_SIGNING_KEY_PATH`, made at the first start with mode 0600. To rotate it, put a new private key first
 * and leave the old one (or its public half) behind it. Throws when what is there is no Ed25519 key.
 */
export function loadSigningKey(settings: Settings): SigningKey {
  const known = keys.get(settings)
  if (known) return known
  if (!settings.signingKey) ensureKeyFile(settings.signingKeyPath)
  const key = readPem(settings.signingKey || readFileSync(settings.signingKeyPath, 'utf8'))
  keys.set(settings, key)
  return key
}

/** The Ed25519 signature of a text (as UTF-8), base64url. */
export function signText(key: SigningKey, text: string): string {
  return sign(null, Buffer.from(text), key.privateKey).toString('base64url')
}

/** What a stored signature is worth: `unknownKey` when its key is neither the present one nor one kept behind it. */
export function checkSignature(key: SigningKey, text: string, stored: { signature: string | null, keyId: string | null }): 'valid' | 'invalid' | 'unknownKey' | 'none' {
  if (!stored.signature) return 'none'
  const publicKey = stored.keyId ? key.known.get(stored.keyId) : undefined
  if (!publicKey) return 'unknownKey'
  return verify(null, Buffer.from(text), publicKey, Buffer.from(stored.signature, 'base64url')) ? 'valid' : 'invalid'
}

/** The keys that this company signs and signed with, the present one first. */
export function listPublicKeys(settings: Settings): { keyId: string, key: PublicJwk, isPresent: boolean }[] {
  const { keyId, known } = loadSigningKey(settings)
  return [...known].map(([id, key]) => ({ keyId: id, key: publicJwkOf(key), isPresent: id === keyId })).sort((one, other) => Number(other.isPresent) - Number(one.isPresent))
}
