import { passWithout } from '#shared/domain/grading'
import type { StrikeView } from '#shared/schemas/item-review'
import { appendAudit } from '../data/audit'
import { findLearner } from '../data/assessors'
import { listModuleAttempts, setAttemptCredential, turnIntoPass, type Attempt, type StoredResult } from '../data/attempts'
import type { Db } from '../data/database'
import { closeRequest } from '../data/sign-offs'
import { endStrike, findStrike, insertStrike, listStruckIds } from '../data/struck-items'
import { requireItem } from './bank-items'
import { issueWhenComplete } from './issuing'
import { tryOut } from './preview'
import { Refusal } from './refusal'
import type { TaughtModule, Teaching } from './teaching'
import type { Work } from './work'

type Turned = Attempt & { submittedAt: string, result: StoredResult }

/** Regrades the failed attempts that were served a struck item; answers those that pass now, as they are after it. */
async function turnAttempts(trx: Db, work: Work, attempts: readonly Attempt[], struck: ReadonlySet<string>): Promise<Turned[]> {
  const turned: Turned[] = []
  for (const attempt of attempts) {
    const { id, result, served, submittedAt } = attempt
    if (!result || !submittedAt || result.passed) continue
    const regraded = { ...result, ...passWithout(result, struck, { items: served.items.map(({ item }) => item), passMark: served.passMark }) }
    if (!regraded.passed || !await turnIntoPass(trx, id, regraded)) continue
    await appendAudit(trx, {
      at: work.now, actorId: work.actor.personId, action: 'attempt.regraded', subject: { kind: 'attempt', id },
      before: { score: result.score, passed: false, mustKnowMissed: result.mustKnowMissed }, after: { personId: attempt.personId, module: attempt.module, score: regraded.score, passed: true, struck: regraded.struck },
    })
    turned.push({ ...attempt, submittedAt, result: regraded })
  }
  return turned
}

/**
 * Issues what is complete through the newest turned attempt of each person who works here. Somebody who passed later
 * on has had their credential from that: an old attempt must not renew it.
 */
async function issueThrough(trx: Db, work: Work, module: TaughtModule, { turned, attempts }: { turned: readonly Turned[], attempts: readonly Attempt[] }): Promise<number> {
  const newest = new Map(turned.map(attempt => [attempt.personId, attempt]))
  let issued = 0
  for (const [personId, attempt] of newest) {
    const passedLater = attempts.slice(attempts.findIndex(one => one.id === attempt.id)).some(one => one.personId === personId && one.passed)
    if (passedLater || !(await findLearner(trx, personId, work.today))?.isEmployed) continue
    const credentialId = await issueWhenComplete(trx, work, { personId, module })
    if (!credentialId) continue
    await setAttemptCredential(trx, attempt.id, { ...attempt.result, credentialId })
    await closeRequest(trx, personId, module.slug, work.now)
    issued++
  }
  return issued
}

/**
 * Takes an item out: it is drawn no more, and failed attempts that pass without it become passed, with their
 * credential where the hands-on is there. No pass is taken back. With `preview` nothing is saved and the answer tells
 * what would change. 404 for no such item, 409 `alreadyStruck`, 409 `tooFewLeft` where the rest would not fill a quiz.
 */
export async function strikeItem(work: Work, teaching: Teaching, { itemId, reason, preview = false }: { itemId: string, reason: string, preview?: boolean }): Promise<StrikeView> {
  const { taught } = requireItem(teaching, itemId)
  const { slug, bank } = taught
  const strike = async (trx: Db): Promise<StrikeView> => {
    if (await findStrike(trx, itemId)) throw new Refusal('conflict', 'alreadyStruck', { message: 'This item is struck' })
    await insertStrike(trx, { itemId, module: slug, reason, struckBy: work.actor.personId, struckAt: work.now })
    const struck = await listStruckIds(trx, slug)
    if (bank.items.filter(item => !struck.has(item.id)).length < bank.quizLength) {
      throw new Refusal('conflict', 'tooFewLeft', { message: 'The other items would not fill a quiz', data: { quizLength: bank.quizLength } })
    }
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'item.struck', subject: { kind: 'item', id: itemId }, after: { module: slug, reason } })
    const attempts = await listModuleAttempts(trx, slug)
    const turned = await turnAttempts(trx, work, attempts.filter(({ served }) => served.items.some(({ item }) => item.id === itemId)), struck)
    const credentials = await issueThrough(trx, work, taught, { turned, attempts })
    return { item: itemId, isStruck: true, attempts: turned.length, people: new Set(turned.map(attempt => attempt.personId)).size, credentials }
  }
  return preview ? tryOut(work.db, strike) : work.db.transaction(strike)
}

/** Puts a struck item back into future draws; what passed through its strike stays passed. 404 for no such item, 409 `notStruck`. */
export async function restoreItem(work: Work, teaching: Teaching, { itemId, reason }: { itemId: string, reason: string }): Promise<StrikeView> {
  const { taught } = requireItem(teaching, itemId)
  return work.db.transaction(async (trx) => {
    const strike = await findStrike(trx, itemId)
    if (!strike) throw new Refusal('conflict', 'notStruck', { message: 'This item is not struck' })
    await endStrike(trx, strike.id, { restoreReason: reason, restoredBy: work.actor.personId, restoredAt: work.now })
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'item.restored', subject: { kind: 'item', id: itemId }, before: { reason: strike.reason }, after: { module: taught.slug, reason } })
    return { item: itemId, isStruck: false, attempts: 0, people: 0, credentials: 0 }
  })
}
