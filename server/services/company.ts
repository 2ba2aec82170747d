import type { CompanyChanges } from '#shared/schemas/company'
import { appendAudit } from '../data/audit'
import { getCompany, updateCompany, type Company } from '../data/company'
import type { Work } from './work'

/** Changes the company's name, zone, language or the mark it asks for. */
export async function changeCompany(work: Work, body: CompanyChanges): Promise<Company> {
  return work.db.transaction(async (trx) => {
    if (Object.keys(body).length === 0) return work.company
    await updateCompany(trx, body)
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'company.changed', subject: { kind: 'company', id: '1' }, before: work.company, after: body })
    return getCompany(trx)
  })
}
