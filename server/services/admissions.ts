import type { Actor } from '#shared/access/abilities'
import type { AdmissionView } from '#shared/schemas/briefing'
import type { TalkView } from '#shared/schemas/talk'
import { clearWrongCodes, codeWaitSeconds, countWrongCode, countWrongCodeOfAll, hasAdmission, insertAdmission, wrongCodesThisMinute } from '../data/admissions'
import { assertNotSealed, endOfBriefingDay, requireBriefing } from './briefing-access'
import { stateOf } from './briefings'
import { randomToken, sha256 } from './hashing'
import { stepOfCode } from './presence'
import { badField, notFound, Refusal } from './refusal'
import { type Talks, toCheckView, toTalkView } from './talks'
import type { Work } from './work'

/** Wrong codes of everybody within a minute, from which browsers without a session are slowed. */
const mostWrongAMinute = 100

/** Somebody signed in is counted by who they are, everybody else by their browser. */
const triesKey = (work: Work<Actor | null>, browserHash: string) => (work.actor ? sha256(`person:${work.actor.personId}`) : browserHash)

const mustWait = (seconds: number) => new Refusal('tooMany', 'tooManyTries', { message: `Wait ${Math.ceil(seconds)} seconds, then try again`, retryAfter: seconds, data: { retryAfter: Math.ceil(seconds) } })

/**
 * Redeems a presence code at once for an admission, for this browser only, that lasts until the sheet is sealed or
 * the site's day ends. An admission is for one sign-in: a second person on the same phone scans again. Throws 409
 * when sealed (judged first), 429 while a wait lasts, 422 for a wrong or stale code.
 */
export async function admit(work: Work<Actor | null>, briefingId: string, code: string, browserHash: string, talks: Talks): Promise<AdmissionView> {
  const { db, now } = work
  const briefing = await requireBriefing(db, briefingId)
  assertNotSealed(briefing, now)
  const key = triesKey(work, browserHash)
  const seconds = await codeWaitSeconds(db, briefingId, key, now)
  if (seconds > 0) throw mustWait(seconds)
  const step = stepOfCode(briefing.secret, code, now)
  if (!work.actor) {
    const all = await wrongCodesThisMinute(db, briefingId, now)
    if (all.wrong >= mostWrongAMinute) throw mustWait(all.secondsLeft)
  }
  if (step === null) {
    await db.transaction(async (trx) => {
      await countWrongCode(trx, briefingId, key, now)
      await countWrongCodeOfAll(trx, briefingId, now)
    })
    throw badField('code', 'That code is wrong or no longer valid', 'wrongCode')
  }
  const admission = randomToken()
  await db.transaction(async (trx) => {
    await insertAdmission(trx, { tokenHash: sha256(admission), briefingId, browserHash, step }, now)
    await clearWrongCodes(trx, briefingId, key)
  })
  const talk = talks.get(briefing.talk)
  return {
    admission, until: endOfBriefingDay(briefing), talk: briefing.talk, talkTitle: { en: briefing.talkVersions.en.title, es: briefing.talkVersions.es.title },
    check: talk ? toCheckView(talk.check) : null, markAsked: work.company.markAsked, asksCheck: false,
  }
}

/** The talk's text for a browser that was admitted to this briefing; 404 for every other. */
export async function readAdmittedTalk(work: Work<Actor | null>, briefingId: string, browserHash: string | undefined, talks: Talks): Promise<TalkView & { state: string }> {
  const briefing = await requireBriefing(work.db, briefingId)
  const talk = talks.get(briefing.talk)
  if (!talk || !browserHash || !await hasAdmission(work.db, briefingId, browserHash)) throw notFound('admission')
  return { ...toTalkView(talk), state: stateOf(briefing) }
}
