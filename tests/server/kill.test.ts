import { randomUUID } from 'node:crypto'
import { expect, it } from 'vitest'
import { briefingSteps } from '../support/briefing-steps'
import { createClient } from '../support/client'
import { startServer } from '../support/server'
import { startSmallCompany } from '../support/small-company'

it('keeps every acknowledged sign-in once when the server is killed while they arrive', async () => {
  const company = await startSmallCompany()
  const foreman = await company.as('foreman')
  const id = await briefingSteps(company, foreman).open()
  const acknowledged = new Map<string, string>()
  const kept = new Map<string, string>()
  let isUp = true

  async function arrive(lane: number): Promise<void> {
    for (let index = 0; isUp; index++) {
      const key = randomUUID()
      kept.set(key, `Guest ${lane}-${index}`)
      const answer = await foreman.post<{ id: string }>(`/api/briefings/${id}/sign-ins`, { key, method: 'foremanDevice', mark: { kind: 'tap' }, visitor: { name: `Guest ${lane}-${index}`, company: 'Redpump' } }).catch(() => null)
      if (answer?.status === 201) acknowledged.set(key, answer.body.id)
    }
  }
  const lanes = Array.from({ length: 8 }, (_, lane) => arrive(lane))
  await expect.poll(() => acknowledged.size, { timeout: 15_000, interval: 5 }).toBeGreaterThan(40)
  const killed = company.server.stop('SIGKILL')
  isUp = false
  await killed
  await Promise.all(lanes)

  const server = await startServer({ folder: company.server.folder, env: { NUXT_CLOCK: '2026-12-01T13:40:00Z' } })
  try {
    const again = createClient(server.origin)
    for (const [name, value] of foreman.cookies) again.cookies.set(name, value)
    const { body } = await again.get<{ signIns: { id: string }[] }>(`/api/briefings/${id}`)
    const ids = body.signIns.map(line => line.id)
    for (const acknowledgedId of acknowledged.values()) expect(ids.filter(one => one === acknowledgedId)).toHaveLength(1)

    // The phone sends what it never heard of again; nothing doubles.
    for (const [key, name] of kept) await again.post(`/api/briefings/${id}/sign-ins`, { key, method: 'foremanDevice', mark: { kind: 'tap' }, visitor: { name, company: 'Redpump' } })
    const after = (await again.get<{ signIns: { name: string }[] }>(`/api/briefings/${id}`)).body.signIns.map(line => line.name)
    expect(after.sort()).toEqual([...kept.values()].sort())
    expect(await company.db.raw('pragma integrity_check')).toEqual([{ integrityCheck: 'ok' }])
  }
  finally {
    await server.stop()
    await company.db.destroy()
  }
})
