import { credentialStateOn, type DutyRecency, expiryAcrossDuties, isForSite, type Credential, type CredentialType } from '#shared/domain/validity'
import type { CredentialState } from '#shared/domain/states'
import type { Db } from '~~/server/data/database'

interface Found { personId: string, type: string, expiresOn: string | null, state: CredentialState }

const rank: CredentialState[] = ['inDate', 'dueSoon', 'expired', 'unverified', 'notYet', 'withdrawn', 'rejected']

/** One line per person now employed, type and site: the standing that counts, worked out straight from the tables. */
export async function loadEffective(db: Db, today: string): Promise<Found[]> {
  const rows = await db('credentials').join('people', 'people.id', 'credentials.personId').join('credentialTypes', 'credentialTypes.id', 'credentials.typeId')
    .where('hiredOn', '<=', today).where(query => query.whereNull('leftOn').orWhere('leftOn', '>', today))
    .select('credentials.*', 'credentialTypes.code', 'credentialTypes.module', 'credentialTypes.leadDays', 'credentialTypes.perSite')
  const days = await db('dutyDays').join('duties', 'duties.id', 'dutyDays.dutyId').groupBy('personId', 'dutyId').select('personId', 'dutyId', db.raw('max(done_on) as last'))
  const asks = await db('duties').join('rules', 'rules.dutyId', 'duties.id').join('ruleTypes', 'ruleTypes.ruleId', 'rules.id').select('duties.id', 'recencyMonths', 'typeId')
  const best = new Map<string, Found>()
  for (const row of rows) {
    const type: Pick<CredentialType, 'module' | 'leadDays' | 'perSite'> = { module: row.module, leadDays: row.leadDays, perSite: row.perSite === 1 }
    const recencies: DutyRecency[] = asks.filter(ask => ask.typeId === row.typeId).map(ask => ({
      recencyMonths: ask.recencyMonths, lastDoneOn: days.find(day => day.personId === row.personId && day.dutyId === ask.id)?.last ?? null }))
    const credential: Credential = { ...row, type: row.code, judgedOn: row.details ? JSON.parse(row.details).judgedOn : null }
    credential.expiresOn = expiryAcrossDuties(credential, type, recencies)
    if (!isForSite(credential, type, row.siteId)) throw new Error('an orientation without its site')
    const found: Found = { personId: row.personId, type: row.code, expiresOn: credential.expiresOn, state: credentialStateOn(credential, type, today) }
    const key = `${row.personId} ${row.code} ${row.siteId}`
    const known = best.get(key)
    const isBetter = !known || rank.indexOf(found.state) < rank.indexOf(known.state) || (found.state === known.state && (found.expiresOn ?? '9999') > (known.expiresOn ?? '9999'))
    if (isBetter) best.set(key, found)
  }
  return [...best.values()]
}
