import { hash, verify } from '@node-rs/argon2'

/** Argon2id with OWASP's parameters: 19 MiB, 2 passes, 1 lane. */
const cost = { memoryCost: 19_456, timeCost: 2, parallelism: 1 }

/** The encoded Argon2id hash of a password or PIN. About 30 ms of work off the main thread. */
export const hashSecret = (secret: string) => hash(secret.normalize('NFC'), cost)

let decoy: Promise<string> | undefined

/** True when `secret` fits `encoded`; a missing hash takes as long to refuse as a wrong secret. */
export async function isRightSecret(encoded: string | null | undefined, secret: string): Promise<boolean> {
  const known = encoded ?? await (decoy ??= hashSecret('nobody has this secret'))
  const fits = await verify(known, secret.normalize('NFC')).catch(() => false)
  return fits && !!encoded
}
