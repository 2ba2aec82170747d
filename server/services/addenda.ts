import type { Actor } from '#shared/access/abilities'
import type { SheetAddendum } from '#shared/domain/sheet'
import { appendAudit } from '../data/audit'
import type { BriefingWithSite } from '../data/briefings'
import { getCompany } from '../data/company'
import type { Db } from '../data/database'
import { listSheetsOfBriefing } from '../data/sheets'
import type { SignIn } from '../data/sign-ins'
import { requireOwnBriefing } from './briefing-access'
import { Refusal } from './refusal'
import type { Settings } from './settings'
import { appendSheet } from './sheets'
import { toSheetHead, toSheetLine } from './sheet-body'
import { loadSigningKey } from './signing-key'
import type { Work } from './work'

interface Given { briefing: BriefingWithSite, by: Pick<Actor, 'personId' | 'name'>, now: string, settings: Settings, text?: string, signIn?: SignIn }

/** Appends an addendum that points at the briefing's sheet; inside the caller's transaction. */
async function append(trx: Db, { briefing, by, now, settings, text, signIn }: Given) {
  const [sheet] = await listSheetsOfBriefing(trx, briefing.id)
  if (!sheet) throw new Refusal('conflict', 'notSealed', { message: 'Seal the briefing first' })
  const company = await getCompany(trx)
  const made = await appendSheet(trx, loadSigningKey(settings), { siteId: briefing.siteId, briefingId: briefing.id, kind: 'addendum', sealedBy: by.personId, sealedAt: now }, (number): SheetAddendum => ({
    kind: 'addendum', ...toSheetHead(briefing), number, company: company.name, addsTo: sheet.hash, text: text ?? null, lines: signIn ? [toSheetLine(signIn)] : [],
    writtenBy: by.name, writtenAt: now, sealedAt: now, sealedBy: by.name, isClockSet: settings.clock.isSet,
  }))
  await appendAudit(trx, { at: now, actorId: by.personId, action: 'briefing.addendum', subject: { kind: 'briefing', id: briefing.id }, after: { hash: made.hash } })
  return made
}

/** A sign-in that came after the seal. */
export const appendSignInAddendum = (trx: Db, given: Given & { signIn: SignIn }) => append(trx, given)

/** A correction in words by who runs the briefing. 409 `notSealed` before the seal: until then the list itself is mended. */
export async function addAddendum(work: Work, briefingId: string, text: string): Promise<{ id: string, hash: string, previousHash: string | null, number: number }> {
  const briefing = await requireOwnBriefing(work, briefingId)
  const { hash, previousHash, number } = await work.db.transaction(trx => append(trx, { briefing, by: work.actor, now: work.now, settings: work.settings, text }))
  return { id: hash, hash, previousHash, number }
}
