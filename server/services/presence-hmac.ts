import { createHmac } from 'node:crypto'
import type { HmacSha1 } from '#shared/domain/presence'

/** HMAC-SHA-1 from node:crypto, for presence codes. */
export const hmacSha1: HmacSha1 = (key, message) => new Uint8Array(createHmac('sha1', key).update(message).digest())
