import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '~~/server/data/database'
import { decideNearMiss, readNearMisses, reportNearMiss } from '~~/server/services/near-misses'
import { Refusal } from '~~/server/services/refusal'
import { suggestForSite } from '~~/server/services/talk-suggestions'
import { toTalk, type Talks } from '~~/server/services/talks'
import { openLearningCompany, workAfter } from '../../support/learning-company'

const at = '2026-01-05T14:00:00.000Z'
let db: Db
beforeEach(async () => {
  db = await openLearningCompany()
  await db('sites').insert([{ id: 'north', code: 'north', name: 'North', timeZone: 'America/Denver', createdAt: at }])
  await db('files').insert([{ id: 'photo', sha256: 'a'.repeat(64), type: 'image/jpeg', size: 3, ownerId: 'nora', createdAt: at }, { id: 'theirs', sha256: 'b'.repeat(64), type: 'image/jpeg', size: 3, ownerId: 'olek', createdAt: at }])
})
const nora = () => workAfter(db, 'nora', 5)
const sara = () => workAfter(db, 'sara', 9, 'safety')
const report = { siteId: 'north', kind: 'formMoved' as const, what: 'The string moved half an inch at the corner.', when: '2026-12-01T13:20:00.000Z' }
async function refusalOf(promise: Promise<unknown>) {
  const error = await promise.then(() => null, (reason: unknown) => reason)
  if (!(error instanceof Refusal)) throw new Error(`not refused: ${String(error)}`)
  return { kind: error.kind, fields: Object.keys(error.details.fields ?? {}) }
}

describe('a near miss', () => {
  it('is seen by who reported it and by the safety manager, with what was done about it', async () => {
    const { id } = await reportNearMiss(await nora(), { ...report, fileIds: ['photo'] })
    expect((await readNearMisses(await workAfter(db, 'olek', 6))).items).toEqual([])
    expect(await readNearMisses(await sara())).toMatchObject({ mayAnswer: true, items: [{ id, site: 'North', reporter: 'Person nora', fileIds: ['photo'], answer: null }] })
    await decideNearMiss(await sara(), id, 'Corner strapped anew; looked at all corners.')
    expect((await readNearMisses(await nora())).items).toMatchObject([{ answer: 'Corner strapped anew; looked at all corners.', answeredBy: 'Person sara' }])
  })

  it('reported without a name leaves no trace of who sent it, on its photos and in the audit trail neither', async () => {
    const { id } = await reportNearMiss(await nora(), { ...report, fileIds: ['photo'], anonymous: true })
    expect((await readNearMisses(await sara())).items).toMatchObject([{ id, reporter: null }])
    expect(await db('nearMisses').first('reporterId')).toEqual({ reporterId: null })
    expect(await db('files').where({ id: 'photo' }).first('ownerId')).toEqual({ ownerId: null })
    expect(await db('audit').where({ subjectId: id }).first('actorId')).toEqual({ actorId: null })
    expect((await readNearMisses(await nora())).items).toEqual([])
  })

  it('is refused with somebody else\'s photo, a time to come, or a site that is not there', async () => {
    expect(await refusalOf(reportNearMiss(await nora(), { ...report, fileIds: ['theirs'] }))).toMatchObject({ fields: ['fileIds'] })
    expect(await refusalOf(reportNearMiss(await nora(), { ...report, when: '2026-12-01T13:36:00.000Z' }))).toMatchObject({ fields: ['when'] })
    expect(await refusalOf(reportNearMiss(await nora(), { ...report, siteId: 'south' }))).toMatchObject({ kind: 'notFound' })
    expect(await refusalOf(decideNearMiss(await sara(), 'nothing', 'x'))).toMatchObject({ kind: 'notFound' })
  })

  it('brings a talk about its hazard to tomorrow\'s suggestions, with the reason', async () => {
    const text = (title: string, hazards: string[]) => ({ title, minutes: 5, work: [], hazards, seasons: [], sources: [], body: null })
    const check = { question: { en: 'q', es: 'q' }, options: [{ id: 'a', text: { en: 'a', es: 'a' } }, { id: 'b', text: { en: 'b', es: 'b' } }], right: 'a', explain: { en: 'e', es: 'e' } }
    const talks: Talks = new Map(['fire', 'burst'].map(hazard => [hazard, toTalk(hazard, { en: text(hazard, [hazard]), es: text(hazard, [hazard]) }, check)]))
    await reportNearMiss(await nora(), report)
    const [first] = await suggestForSite(await sara(), { site: 'north', date: '2026-12-02' }, talks)
    expect(first).toMatchObject({ slug: 'burst', reasons: expect.arrayContaining([{ kind: 'nearMiss', date: '2026-12-01', isHere: true }]) })
    const later = await suggestForSite(await sara(), { site: 'north', date: '2027-01-15' }, talks)
    expect(later.flatMap(talk => talk.reasons).some(reason => reason.kind === 'nearMiss')).toBe(false)
  })
})
