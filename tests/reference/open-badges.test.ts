import { generateKeyPairSync, verify } from 'node:crypto'
import { mkdtempSync } from 'node:fs'
import Ajv2019 from 'ajv/dist/2019'
import addFormats from 'ajv-formats'
import { beforeAll, describe, expect, it } from 'vitest'
import { recheck } from '#shared/domain/recheck'
import { makeCardToken } from '../../server/services/cards'
import { listPublicKeys, loadSigningKey } from '../../server/services/signing-key'
import { hold, openCredentialCompany, workOf } from '../support/credential-company'
import { testSettings } from '../support/work'

/*
 * What 1EdTech's Open Badges 3.0 (final 1.0) and its JSON schema for an AchievementCredential ask of each member, and
 * section 8.2 of its JSON Web Token. Written from memory of the standard; the schema file itself is not shipped.
 */
const type = (...wanted: string[]) => ({ type: 'array', minItems: 1, items: { type: 'string' }, contains: { enum: wanted } })
const uri = { type: 'string', format: 'uri' }
const moment = { type: 'string', pattern: '^\\d{4}-\\d\\d-\\d\\dT\\d\\d:\\d\\d:\\d\\d(\\.\\d+)?(Z|[+-]\\d\\d:\\d\\d)$' }
const schema = {
  type: 'object',
  required: ['@context', 'id', 'type', 'credentialSubject', 'issuer', 'validFrom', 'iss', 'jti', 'sub', 'nbf'],
  properties: {
    '@context': { type: 'array', minItems: 2, prefixItems: [], items: { type: 'string' }, allOf: [{ contains: { const: 'https://www.w3.org/ns/credentials/v2' } }, { contains: { type: 'string', pattern: '^https://purl\\.imsglobal\\.org/spec/ob/v3p0/context-3\\.\\d\\.\\d\\.json$' } }] },
    'id': uri,
    'type': { allOf: [type('VerifiableCredential'), type('OpenBadgeCredential', 'AchievementCredential')] },
    'name': { type: 'string' }, 'description': { type: 'string' },
    'issuer': { type: 'object', required: ['id', 'type'], properties: { id: uri, type: type('Profile'), name: { type: 'string' }, url: uri } },
    'validFrom': moment, 'validUntil': moment,
    'credentialSubject': {
      type: 'object', required: ['type', 'achievement', 'id'],
      properties: {
        id: uri, type: type('AchievementSubject'),
        identifier: { type: 'array', items: { type: 'object', required: ['type', 'hashed', 'identityHash', 'identityType'], properties: { type: { const: 'IdentityObject' }, hashed: { type: 'boolean' }, identityHash: { type: 'string' }, identityType: { enum: ['name', 'systemId', 'emailAddress', 'identifier'] } } } },
        achievement: { type: 'object', required: ['id', 'type', 'criteria', 'description', 'name'], properties: { id: uri, type: type('Achievement'), name: { type: 'string' }, description: { type: 'string' }, criteria: { type: 'object', required: ['narrative'], properties: { narrative: { type: 'string' } } }, inLanguage: { type: 'string', pattern: '^[a-z]{2,4}(-.*)?$' } } },
      },
    },
    'iss': uri, 'jti': uri, 'sub': uri, 'nbf': { type: 'integer' }, 'exp': { type: 'integer' },
  },
}

let token: string
let settings: ReturnType<typeof testSettings>
beforeAll(async () => {
  settings = testSettings({ databasePath: `${mkdtempSync('/tmp/pourwright-key-')}/db.sqlite` })
  const db = await openCredentialCompany()
  token = await makeCardToken(await workOf(db, 'hal', { settings }), await hold(db, { issuedOn: '2026-03-13', expiresOn: '2027-03-13' }), 'https://walls.test')
})
const parts = () => token.split('.').slice(0, 2).map(part => JSON.parse(Buffer.from(part, 'base64url').toString()) as unknown) as unknown as [Record<string, unknown>, Record<string, { id: string }> & { validFrom: string, validUntil: string, nbf: number, exp: number, jti: string, id: string }]

describe('the signed form of a card', () => {
  it('has the members and shapes that Open Badges 3.0 asks for', () => {
    const ajv = new Ajv2019({ strict: false })
    addFormats(ajv)
    expect(ajv.validate(schema, parts()[1]) ? [] : ajv.errors).toEqual([])
  })

  it('says the same in the token\'s claims as in the credential (section 8.2): jti, iss, sub, nbf, exp', () => {
    const [head, claims] = parts()
    expect(head).toMatchObject({ alg: 'EdDSA', typ: 'JWT', jwk: { kty: 'OKP', crv: 'Ed25519' } })
    expect(claims).toMatchObject({ jti: claims.id, iss: claims.issuer!.id, sub: claims.credentialSubject!.id, nbf: Date.parse(claims.validFrom) / 1000, exp: Date.parse(claims.validUntil) / 1000 })
    // The last good second of March 13 in Denver, on the eve of the clocks' change (14 March 2027).
    expect(claims.validUntil).toBe('2027-03-14T07:00:00Z')
  })

  it('is verified by Node\'s own Ed25519 with the key that the company publishes', () => {
    const [head, body, signature] = token.split('.') as [string, string, string]
    expect(parts()[0].jwk).toEqual(listPublicKeys(settings)[0]!.key)
    expect(verify(null, Buffer.from(`${head}.${body}`), loadSigningKey(settings).publicKey, Buffer.from(signature, 'base64url'))).toBe(true)
  })
})

describe('the recheck without a server', () => {
  const at = (instant: string) => Date.parse(instant) / 1000
  it('finds it good from its first moment to its last, by a key id that is the company\'s', () => {
    for (const [instant, time] of [['2026-03-13T05:59:59Z', 'notYet'], ['2026-03-13T06:00:00Z', 'good'], ['2027-03-14T06:59:59Z', 'good'], ['2027-03-14T07:00:00Z', 'over']] as const) {
      expect(recheck(token, at(instant))).toMatchObject([{ kind: 'card', signature: 'valid', time, keyId: loadSigningKey(settings).keyId }])
    }
  })

  it('finds every single changed letter of it', () => {
    const now = at('2026-12-01T12:00:00Z')
    const letters = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_'
    const [, , signature] = token.split('.') as [string, string, string]
    for (let place = 0; place < token.length; place += 1) {
      // The last letter of base64url holds bits that no byte uses: its neighbours may mean the same signature.
      if (token[place] === '.' || place === token.length - 1) continue
      const changed = token.slice(0, place) + letters[(letters.indexOf(token[place]!) + 1) % 64] + token.slice(place + 1)
      const [found] = recheck(changed, now)
      expect([place, found!.kind === 'unreadable' || found!.signature === 'invalid' || found!.keyId !== loadSigningKey(settings).keyId]).toEqual([place, true])
    }
    expect(signature.length).toBe(86)
  }, 60_000)

  it('tells a card that somebody else signed by its key, and refuses one that names no signature', () => {
    const stranger = generateKeyPairSync('ed25519')
    expect(stranger.publicKey.asymmetricKeyType).toBe('ed25519')
    const none = `${Buffer.from(JSON.stringify({ alg: 'none', jwk: parts()[0].jwk })).toString('base64url')}.${token.split('.')[1]!}.AA`
    expect(recheck(none, 0)).toEqual([{ kind: 'unreadable' }])
    for (const junk of ['', '?', 'a.b.c', '{}', '[]', 'null', '{"sheet":{"kind":"sheet"},"hash":1}']) expect(recheck(junk, 0)).toEqual([{ kind: 'unreadable' }])
  })
})
