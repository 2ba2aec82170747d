import { randomUUID } from 'node:crypto'
import { Secret, TOTP } from 'otpauth'
import type { AdmissionView, BriefingView, PresenceView, SignInAnswer } from '#shared/schemas/briefing'
import type { Client } from './client'
import type { SmallCompany } from './small-company'

export interface Problem { data: { code: string, fields?: Record<string, string>, retryAfter?: number } }

/** The steps of a morning at the small company's first site, over its routes. */
export function briefingSteps(company: SmallCompany, foreman: Client) {
  const presence = async (id: string) => (await foreman.get<PresenceView>(`/api/briefings/${id}/presence`)).body
  const sign = (client: Client, id: string, body: Record<string, unknown>) => client.post<SignInAnswer & Problem>(`/api/briefings/${id}/sign-ins`, { key: randomUUID(), mark: { kind: 'tap' }, ...body })
  return {
    presence, sign,
    open: async (body: Record<string, unknown> = {}) => (await foreman.post<{ id: string }>('/api/briefings', { siteId: 'site-a', talk: 'capped-bars', work: ['steel'], ...body })).body.id,
    admit: async (id: string, client = company.visitor()) => {
      const { body } = await client.post<AdmissionView>(`/api/briefings/${id}/admissions`, { code: (await presence(id)).code })
      return { client, admission: body.admission }
    },
    byPhone: (client: Client, id: string, admission: string, body: Record<string, unknown> = {}) => sign(client, id, { method: 'ownPhone', admission, language: 'en', ...body }),
    view: async (id: string) => (await foreman.get<BriefingView>(`/api/briefings/${id}`)).body,
    seal: async (id: string) => {
      await foreman.post(`/api/briefings/${id}/closing`, {})
      return (await foreman.post<{ sheetHash: string, previousHash: string | null }>(`/api/briefings/${id}/sealing`, {})).body
    },
    /** Another library's idea of the briefing's codes. */
    totp: async (id: string) => {
      const { secret } = await company.db('briefings').where({ id }).first('secret')
      return new TOTP({ secret: new Secret({ buffer: Uint8Array.from(secret as Uint8Array).buffer }), digits: 6, period: 30, algorithm: 'SHA1' })
    },
  }
}
