import { ed25519 } from '@noble/curves/ed25519.js'
import { sha256 } from '@noble/hashes/sha2.js'
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils.js'
import type { OpenBadgeClaims } from './open-badge'
import { hashInput, type BriefingSheet, type SheetAddendum } from './sheet'

/** A public Ed25519 key as JWK (RFC 8037). */
export interface PublicJwk { kty: string, crv: string, x: string }

/** What a file is worth by itself. `signature` is judged with the key that the file brings along. */
export type Recheck
  = | { kind: 'sheet' | 'addendum', isIntact: boolean, signature: 'valid' | 'invalid' | 'none', keyId: string | null, hash: string, sheet: BriefingSheet | SheetAddendum }
    | { kind: 'card', signature: 'valid' | 'invalid', keyId: string, time: 'good' | 'notYet' | 'over', claims: OpenBadgeClaims }
    | { kind: 'unreadable' }

const fromBase64Url = (text: string): Uint8Array => Uint8Array.from(atob(text.replaceAll('-', '+').replaceAll('_', '/')), letter => letter.charCodeAt(0))
const toBase64Url = (bytes: Uint8Array) => btoa(String.fromCharCode(...bytes)).replaceAll('+', '-').replaceAll('/', '_').replace(/=+$/, '')
const parseUtf8 = (bytes: Uint8Array): unknown => JSON.parse(new TextDecoder('utf-8', { fatal: true }).decode(bytes))

/** The RFC 7638 thumbprint of a public Ed25519 key, base64url: the company's key id. */
export const thumbprintOf = ({ crv, kty, x }: PublicJwk) => toBase64Url(sha256(utf8ToBytes(JSON.stringify({ crv, kty, x }))))

function isSignedBy(key: unknown, text: string, signature: string): boolean {
  const { kty, crv, x } = (key ?? {}) as Partial<PublicJwk>
  if (kty !== 'OKP' || crv !== 'Ed25519' || typeof x !== 'string') return false
  try {
    return ed25519.verify(fromBase64Url(signature), utf8ToBytes(text), fromBase64Url(x))
  }
  catch {
    return false
  }
}

function recheckCard(token: string, nowSeconds: number): Recheck {
  const [head, body, signature] = token.split('.') as [string, string, string]
  const { alg, jwk } = parseUtf8(fromBase64Url(head)) as { alg?: string, jwk?: PublicJwk }
  const claims = parseUtf8(fromBase64Url(body)) as OpenBadgeClaims
  if (alg !== 'EdDSA' || !jwk || !Array.isArray(claims.type) || !claims.type.includes('OpenBadgeCredential')) return { kind: 'unreadable' }
  const time = typeof claims.nbf !== 'number' || nowSeconds < claims.nbf ? 'notYet' : claims.exp !== undefined && nowSeconds >= claims.exp ? 'over' : 'good'
  return { kind: 'card', signature: isSignedBy(jwk, `${head}.${body}`, signature) ? 'valid' : 'invalid', keyId: thumbprintOf(jwk), time, claims }
}

interface SheetFile { sheet: BriefingSheet | SheetAddendum, previousHash: string | null, hash: string, signature?: string, publicKey?: PublicJwk | null, addenda?: SheetFile[] }

function recheckSheet({ sheet, previousHash, hash, signature, publicKey }: SheetFile): Recheck {
  const input = hashInput({ previousHash, sheet })
  const isIntact = bytesToHex(sha256(utf8ToBytes(input))) === hash
  const judged = !signature || !publicKey ? 'none' : isSignedBy(publicKey, input, signature) ? 'valid' : 'invalid'
  return { kind: sheet.kind, isIntact, signature: judged, keyId: publicKey ? thumbprintOf(publicKey) : null, hash, sheet }
}

/**
 * Rechecks what somebody was given, without any server: a card in its signed form (a JSON Web Token, RFC 7515 and RFC
 * 8037) or an exported sheet with its addenda (SHA-256 over RFC 8785). Never throws: what is neither is `unreadable`.
 */
export function recheck(text: string, nowSeconds: number): Recheck[] {
  try {
    const trimmed = text.trim()
    if (/^[\w-]+\.[\w-]+\.[\w-]+$/.test(trimmed)) return [recheckCard(trimmed, nowSeconds)]
    const file = JSON.parse(trimmed) as SheetFile
    if (typeof file.hash !== 'string' || (file.sheet?.kind !== 'sheet' && file.sheet?.kind !== 'addendum')) return [{ kind: 'unreadable' }]
    return [file, ...(file.addenda ?? []).map(addendum => ({ ...addendum, publicKey: file.publicKey }))].map(recheckSheet)
  }
  catch {
    return [{ kind: 'unreadable' }]
  }
}
