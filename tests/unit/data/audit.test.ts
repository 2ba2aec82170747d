import { beforeEach, describe, expect, it } from 'vitest'
import { appendAudit, checkAuditChain } from '../../../server/data/audit'
import type { Db } from '../../../server/data/database'
import { openTestDatabase } from '../../support/work'

let db: Db
const entry = (number: number) => ({ at: `2026-12-01T13:30:0${number}.000Z`, actorId: null, action: 'site.changed', subject: { kind: 'site', id: String(number) }, before: { name: 'Old' }, after: { name: `New ${number}` } })

beforeEach(async () => {
  db = await openTestDatabase()
  for (const number of [1, 2, 3, 4]) await db.transaction(trx => appendAudit(trx, entry(number)))
  for (const verb of ['update', 'delete']) await db.raw(`drop trigger audit_no_${verb}`)
  return () => db.destroy()
})

describe('the audit chain', () => {
  it('is intact after plain work', async () => {
    expect(await checkAuditChain(db)).toEqual({ intact: true, rows: 4 })
  })

  it.each([['at', '2026-12-01T13:30:09.000Z'], ['action', 'site.changeD'], ['subjectId', '9'], ['detailsDigest', 'f'.repeat(64)], ['hash', 'f'.repeat(64)]])('shows a changed %s', async (column, value) => {
    await db('audit').where({ seq: 2 }).update({ [column]: value })
    expect(await checkAuditChain(db)).toMatchObject({ intact: false, brokenAt: 2 })
  })

  it('shows changed details', async () => {
    await db('auditDetails').where({ seq: 3 }).update({ details: '{"before":null,"after":{"name":"New 3!"}}' })
    expect(await checkAuditChain(db)).toMatchObject({ intact: false, brokenAt: 3 })
  })

  it('shows a row taken out of the middle', async () => {
    await db('auditDetails').where({ seq: 2 }).delete()
    await db('audit').where({ seq: 2 }).delete()
    expect(await checkAuditChain(db)).toMatchObject({ intact: false, brokenAt: 3 })
  })

  it('stays intact when details are erased, because it runs over their digests', async () => {
    await db('auditDetails').where({ seq: 2 }).delete()
    expect(await checkAuditChain(db)).toEqual({ intact: true, rows: 4 })
  })

  it('keeps its order when changes come at once', async () => {
    await Promise.all([5, 6, 7, 8, 9].map(number => db.transaction(trx => appendAudit(trx, entry(number)))))
    expect(await checkAuditChain(db)).toEqual({ intact: true, rows: 9 })
  })
})
