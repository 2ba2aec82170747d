import { mkdtempSync, readFileSync, statSync } from 'node:fs'
import { createPrivateKey, generateKeyPairSync } from 'node:crypto'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { checkSignature, loadSigningKey, signText } from '~~/server/services/signing-key'
import { toSettings } from '~~/server/services/settings'

const settingsWith = (raw: { signingKeyPath?: string, signingKey?: string }) => toSettings({
  databasePath: '', filesPath: '', signingKeyPath: '', signingKey: '', clock: '', demo: '', origin: '', tls: '', smtpUrl: '', mailFrom: '', setupToken: '', ...raw,
})
const pem = () => generateKeyPairSync('ed25519').privateKey.export({ type: 'pkcs8', format: 'pem' }).toString()

describe('the signing key', () => {
  it('is made at the first start, for its owner only, and stays the same after', () => {
    const path = join(mkdtempSync(join(tmpdir(), 'key-')), 'deep', 'signing-key.pem')
    const first = loadSigningKey(settingsWith({ signingKeyPath: path }))
    expect(statSync(path).mode & 0o777).toBe(0o600)
    expect(readFileSync(path, 'utf8')).toContain('PRIVATE KEY')
    expect(loadSigningKey(settingsWith({ signingKeyPath: path })).keyId).toBe(first.keyId)
  })

  it('names the key by its RFC 7638 thumbprint (example of RFC 8037, appendix A.3)', () => {
    const privateKey = createPrivateKey({ format: 'jwk', key: { kty: 'OKP', crv: 'Ed25519', d: 'nWGxne_9WmC6hEr0kuwsxERJxWl7MmkZcDusAxyuf2A', x: '11qYAYKxCrfVS_7TyWQHOg7hcvPapiMlrwIaaPcHURo' } })
    const key = loadSigningKey(settingsWith({ signingKey: privateKey.export({ type: 'pkcs8', format: 'pem' }).toString() }))
    expect(key.keyId).toBe('kPrK_qmxVWaYVA9wwBF6Iuo3vVzz7TxHCTwXBygrS4k')
  })

  it('signs text so that a changed letter no longer fits', () => {
    const key = loadSigningKey(settingsWith({ signingKey: pem() }))
    const signature = signText(key, 'nine signed')
    expect(checkSignature(key, 'nine signed', { signature, keyId: key.keyId })).toBe('valid')
    expect(checkSignature(key, 'ten signed', { signature, keyId: key.keyId })).toBe('invalid')
    expect(checkSignature(key, 'nine signed', { signature: null, keyId: null })).toBe('none')
  })

  it('still checks old signatures after a rotation, and says so when the old key is gone', () => {
    const oldPem = pem()
    const old = loadSigningKey(settingsWith({ signingKey: oldPem }))
    const stored = { signature: signText(old, 'sheet'), keyId: old.keyId }
    const rotated = loadSigningKey(settingsWith({ signingKey: `${pem()}\n${oldPem}` }))
    expect(rotated.keyId).not.toBe(old.keyId)
    expect(checkSignature(rotated, 'sheet', stored)).toBe('valid')
    expect(checkSignature(loadSigningKey(settingsWith({ signingKey: pem() })), 'sheet', stored)).toBe('unknownKey')
  })

  it('refuses a key of another kind', () => {
    const rsa = generateKeyPairSync('rsa', { modulusLength: 2048 }).privateKey.export({ type: 'pkcs8', format: 'pem' }).toString()
    expect(() => loadSigningKey(settingsWith({ signingKey: rsa }))).toThrow('Ed25519')
  })
})
