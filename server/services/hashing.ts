import { createHash, randomBytes, timingSafeEqual } from 'node:crypto'
import canonicalize from 'canonicalize'

/** Lower-case hex SHA-256 of text (as UTF-8) or bytes. */
export const sha256 = (data: string | Uint8Array) => createHash('sha256').update(data).digest('hex')

/** RFC 8785 canonical JSON. Throws on what JSON can't hold (undefined at the top, non-finite numbers). */
export function canonicalJson(value: unknown): string {
  const text = canonicalize(value)
  if (text === undefined) throw new TypeError('Nothing to canonicalise')
  return text
}

/** An unguessable word for links and codes: `bytes` random bytes (16 = 128 bits) in URL-safe base64. */
export const randomToken = (bytes = 24) => randomBytes(bytes).toString('base64url')

/** Crockford's 32 letters without the easily confused ones: codes that people read aloud. */
const codeLetters = '0123456789ABCDEFGHJKMNPQRSTVWXYZ'

/** A code for reading aloud: `length` letters of 5 random bits each (18 = 90 bits). */
export const randomCode = (length = 18) => Array.from(randomBytes(length), byte => codeLetters[byte & 31]).join('')

/** Compares two texts in constant time. */
export function isSameSecret(left: string, right: string): boolean {
  const a = Buffer.from(sha256(left))
  const b = Buffer.from(sha256(right))
  return timingSafeEqual(a, b)
}
