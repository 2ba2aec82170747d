import type { BriefingSheet } from '#shared/domain/sheet'
import type { Language } from '#shared/domain/states'
import { listAllowancesOf } from '../data/allowances'
import { appendAudit } from '../data/audit'
import { type BriefingWithSite, closeBriefing, getEmployer, listUnsealed, markSealed } from '../data/briefings'
import { getCompany } from '../data/company'
import { listSignIns } from '../data/sign-ins'
import { listSheetsOfBriefing } from '../data/sheets'
import { listManagersToTell } from '../data/sealing-mail'
import type { Db } from '../data/database'
import { addMinutes, compareInstants, endOfDay } from '#shared/domain/dates'
import { requireBriefing, requireOwnBriefing } from './briefing-access'
import { tellBriefing } from './briefing-events'
import { queueMail } from './mail'
import { Refusal } from './refusal'
import { expectedPeople } from './roster'
import { appendSheet } from './sheets'
import { buildSheet } from './sheet-body'
import { loadSigningKey } from './signing-key'
import type { Settings } from './settings'
import type { Work } from './work'
import { sealingMail } from '../documents/sealing-mail'

interface Sealer { now: string, settings: Settings, origin: string, actorId: string | null, actorName: string | null }

/** The last thing that happened at a briefing that nobody closed. */
async function lastMoment(db: Db, briefing: BriefingWithSite): Promise<string> {
  const signed = (await listSignIns(db, briefing.id)).map(row => row.signedAt)
  return [briefing.openedAt, ...signed].reduce((latest, at) => (compareInstants(at, latest) > 0 ? at : latest))
}

async function mailTheHash(trx: Db, sealer: Sealer, sheet: { hash: string, body: BriefingSheet }): Promise<void> {
  const checkUrl = sealer.origin ? `${sealer.origin}/check/${sheet.hash}` : `/check/${sheet.hash}`
  for (const manager of await listManagersToTell(trx)) {
    const mail = sealingMail(sheet.body, { hash: sheet.hash, checkUrl, language: manager.language as Language })
    await queueMail(trx, { key: `sheet:${sheet.hash}:${manager.id}`, recipient: manager.email, personId: manager.id, ...mail, now: sealer.now })
  }
}

/**
 * Seals a briefing: its data in canonical JSON, the hash of the site's sheet before it, the company's signature,
 * and a mail with the hash to every safety manager, so that the chain's head is known outside the database.
 * A repeat answers with the first seal.
 */
async function seal(db: Db, id: string, sealer: Sealer): Promise<{ sheetHash: string, previousHash: string | null }> {
  const key = loadSigningKey(sealer.settings)
  const made = await db.transaction(async (trx) => {
    const briefing = await requireBriefing(trx, id)
    const [known] = await listSheetsOfBriefing(trx, id)
    if (known) return { hash: known.hash, previousHash: known.previousHash, isNew: false }
    const closedAt = briefing.closedAt ?? await lastMoment(trx, briefing)
    if (!briefing.closedAt) await closeBriefing(trx, id, closedAt)
    const [signIns, expected, company] = [await listSignIns(trx, id), await expectedPeople(trx, briefing.siteId, briefing.localDate), await getCompany(trx)]
    const allowances = await listAllowancesOf(trx, { siteId: briefing.siteId, date: briefing.localDate })
    const speakerEmployer = await getEmployer(trx, briefing.runBy)
    const sheet = await appendSheet(trx, key, { siteId: briefing.siteId, briefingId: id, kind: 'sheet', sealedBy: sealer.actorId, sealedAt: sealer.now }, number => buildSheet({
      briefing, closedAt, company: company.name, speakerEmployer, number, signIns, expected, allowances,
      seal: { sealedAt: sealer.now, sealedBy: sealer.actorName, isClockSet: sealer.settings.clock.isSet },
    }))
    await markSealed(trx, id, sealer.now)
    await appendAudit(trx, { at: sealer.now, actorId: sealer.actorId, action: 'briefing.sealed', subject: { kind: 'briefing', id }, after: { hash: sheet.hash, previousHash: sheet.previousHash, automatically: sealer.actorId === null } })
    await mailTheHash(trx, sealer, sheet)
    return { ...sheet, isNew: true }
  })
  if (made.isNew) tellBriefing(id, { kind: 'sealed', data: { sheetHash: made.hash } })
  return { sheetHash: made.hash, previousHash: made.previousHash }
}

/** Seals a closed briefing of the actor's. 409 `stillOpen` before its closing. */
export async function sealOwnBriefing(work: Work, id: string, origin: string): Promise<{ sheetHash: string, previousHash: string | null }> {
  const briefing = await requireOwnBriefing(work, id)
  if (!briefing.closedAt) throw new Refusal('conflict', 'stillOpen', { message: 'Close the briefing first' })
  return seal(work.db, id, { now: work.now, settings: work.settings, origin, actorId: work.actor.personId, actorName: work.actor.name })
}

/** What a phone kept without signal gets this long to arrive whole before its day is sealed. */
const minutesForLateArrivals = 60

/** Seals what was left open or unsealed when its site's day ended, marked so. Safe to run at any time, any number of times. */
export async function sealLeftOvers(db: Db, settings: Settings): Promise<number> {
  const now = settings.clock.now()
  let sealed = 0
  for (const row of await listUnsealed(db)) {
    const dayEnds = endOfDay(row.localDate, row.timeZone)
    const arrivalEnds = row.withoutSignal === 1 ? addMinutes(row.createdAt, minutesForLateArrivals) : dayEnds
    if (compareInstants(now, dayEnds) < 0 || compareInstants(now, arrivalEnds) < 0) continue
    await seal(db, row.id, { now, settings, origin: settings.origin, actorId: null, actorName: null })
    sealed++
  }
  return sealed
}
