import { addDays, startOfDay } from '#shared/domain/dates'
import type { AuditQuery, AuditView } from '#shared/schemas/audit'
import type { Page } from '#shared/schemas/common'
import { checkAuditChain } from '../data/audit'
import { listAudit } from '../data/views/audit-list'
import type { Work } from './work'

/** A page of the trail, the newest first; days are the company's. */
export async function readAudit(work: Work, { from, to, page, perPage, ...filter }: AuditQuery): Promise<Page<AuditView>> {
  const { timeZone } = work.company
  const since = from && startOfDay(from, timeZone)
  const until = to && startOfDay(addDays(to, 1), timeZone)
  return { ...await listAudit(work.db, { ...filter, since, until }, { page, perPage }), page, perPage }
}

/** Recomputes the whole chain of the audit trail; `brokenAt` is the first row that no longer fits. */
export const checkAudit = (work: Work) => checkAuditChain(work.db)
