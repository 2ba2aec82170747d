import type { Credential, CredentialType } from '#shared/domain/validity'

/** A verified card of the type `ladders`, issued 2026-01-15, that never expires; change what the case is about. */
export function aCredential(changes: Partial<Credential> = {}): Credential {
  return { id: 'c1', type: 'ladders', issuedOn: '2026-01-15', expiresOn: null, verification: 'verified', ...changes }
}

/** A company type `ladders` that never expires, with a lead of 60 days; change what the case is about. */
export function aType(changes: Partial<CredentialType> = {}): CredentialType {
  return { code: 'ladders', validity: { kind: 'never' }, basis: 'company', leadDays: 60, ...changes }
}
