import { randomUUID } from 'node:crypto'
import { dateInZone } from '#shared/domain/dates'
import { halvesToIssue } from '#shared/domain/issuing'
import { expiryOf } from '#shared/domain/validity'
import { appendAudit } from '../data/audit'
import { listUnusedPasses } from '../data/attempts'
import type { Db } from '../data/database'
import { findModuleType, insertModuleCredential } from '../data/module-credentials'
import { listUnusedSignOffs } from '../data/sign-offs'
import { randomCode } from './hashing'
import type { TaughtModule } from './teaching'
import type { Work } from './work'

/**
 * Issues a module's credential when quiz and hands-on are both there, whichever came last; answers its id, or null
 * while something is missing. It counts from the company's date of the last half. Call it inside the transaction
 * that recorded that half.
 */
export async function issueWhenComplete(trx: Db, work: Work, { personId, module }: { personId: string, module: TaughtModule }): Promise<string | null> {
  const { now, today, company, actor } = work
  const onDate = (instant: string) => dateInZone(instant, company.timeZone)
  const passes = await listUnusedPasses(trx, [personId], module.slug)
  const signOffs = await listUnusedSignOffs(trx, personId, module.slug)
  const halves = halvesToIssue({
    passedQuizzes: passes.map(pass => ({ id: pass.id, doneOn: onDate(pass.submittedAt) })),
    handsOns: signOffs.map(({ id, passed, signedAt }) => ({ id, passed, doneOn: onDate(signedAt) })),
    hasChecklist: module.text.en.checklist.length > 0,
    today,
  })
  const type = halves && await findModuleType(trx, module.slug)
  if (!halves || !type) return null
  const issued = {
    id: randomUUID(), personId, typeId: type.id, issuedOn: today, expiresOn: expiryOf(type.validity, today),
    issuer: company.name || null, attemptId: halves.attemptId, signOffId: halves.signOffId, cardCode: randomCode(18),
    verifiedBy: signOffs.find(signOff => signOff.id === halves.signOffId)?.assessorId ?? null, createdBy: actor.personId,
  }
  await insertModuleCredential(trx, { ...issued, now })
  const { cardCode: _secret, ...after } = issued
  await appendAudit(trx, { at: now, actorId: actor.personId, action: 'credential.issued', subject: { kind: 'credential', id: issued.id }, after })
  return issued.id
}
