import { beforeEach, describe, expect, test } from 'vitest'
import { addDays } from '#shared/domain/dates'
import type { Db } from '../../../server/data/database'
import { printStrips, queueReminders, reminderStep, sendReminders } from '../../../server/services/reminders'
import { hold, openCredentialCompany, workOf } from '../../support/credential-company'
import { pagesOf } from '../../support/read-pdf'
import { testSettings } from '../../support/work'

let db: Db
beforeEach(async () => {
  db = await openCredentialCompany()
  return () => db.destroy()
})

const runOn = (date: string, time = '13:30:00Z') => queueReminders(db, { ...testSettings(), clock: { now: () => `${date}T${time}`, isSet: true } })
const mail = (): Promise<{ recipient: string, subject: string, body: string, key: string }[]> => db('mail').orderBy(['createdAt', 'recipient']).select('recipient', 'subject', 'body', 'key')

test.each([[61, null], [60, 'd60'], [31, 'd60'], [30, 'd30'], [8, 'd30'], [7, 'd7'], [0, 'd7'], [-1, 'after']])('with %i days left the warning due is %s', (days, step) => {
  expect(reminderStep(days)).toBe(step)
})

describe('the daily run', () => {
  test('over a whole life tells at 60, 30 and 7 days and on the day after, and never twice', async () => {
    await hold(db, { expiresOn: '2027-03-01' })
    const told: string[] = []
    for (let date = '2026-12-01'; date <= '2027-03-20'; date = addDays(date, 1)) {
      for (const time of ['13:30:00Z', '13:45:00Z']) {
        if (await runOn(date, time) > 0) told.push(date)
      }
    }
    expect(told).toEqual(['2026-12-31', '2027-01-30', '2027-02-22', '2027-03-02'])
    expect(await db('mail').where({ recipient: 'hal@test.example' }).count({ n: '*' }).first()).toEqual({ n: 4 })
  })

  test('after downtime tells only what is due now', async () => {
    await hold(db, { expiresOn: '2027-03-01' })
    expect(await runOn('2027-02-10')).toBe(3)
    expect(await runOn('2027-02-11')).toBe(0)
    expect(await runOn('2027-02-22')).toBe(3)
  })

  test('writes one digest a person, in their language: to the holder, the foreman, the safety manager', async () => {
    await hold(db, { expiresOn: '2026-12-05' })
    await hold(db, { type: 'lift-truck', expiresOn: '2026-11-28' })
    await hold(db, { personId: 'ines', expiresOn: '2026-12-31' })
    expect(await runOn('2026-12-01')).toBe(3)
    const [foreman, hand, safety] = await mail()
    expect(hand).toMatchObject({ recipient: 'hal@test.example', subject: 'Credentials: 1 expired, 1 expiring soon' })
    expect(hand!.body).toContain('Lift truck evaluation: Sat, Nov 28, 2026 (3 days ago)')
    expect(hand!.body).not.toContain('Quispe')
    expect(foreman).toMatchObject({ recipient: 'fay@test.example', subject: 'Credenciales: 1 vencida, 1 por vencer' })
    expect(foreman!.body).toContain('Hand, Hal: Primeros auxilios y RCP')
    expect(safety!.body).toContain('Quispe, Inés')
    expect(await runOn('2026-12-01', '20:00:00Z')).toBe(0)
  })

  test('counts its day in the company\'s zone', async () => {
    await hold(db, { expiresOn: '2026-12-01' })
    await runOn('2026-12-02', '06:59:59Z')
    expect(await db('reminderMarks').pluck('step')).toEqual(['d7'])
    await runOn('2026-12-02', '07:00:00Z')
    expect((await db('reminderMarks').pluck('step')).sort()).toEqual(['after', 'd7'])
  })

  test('says nothing of what was renewed, is not verified, or belongs to somebody who left', async () => {
    await hold(db, { expiresOn: '2026-12-05' })
    await hold(db, { expiresOn: '2028-12-05' })
    await hold(db, { type: 'lift-truck', expiresOn: '2026-12-05', verification: 'unverified' })
    await db('people').where({ id: 'ines' }).update({ leftOn: '2026-11-01' })
    await hold(db, { personId: 'ines', expiresOn: '2026-12-05' })
    expect(await runOn('2026-12-01')).toBe(0)
    expect(await mail()).toEqual([])
  })
})

describe('sent by hand', () => {
  test('reaches the holder and the foreman once a day, and names who has no address', async () => {
    const sam = await workOf(db, 'sam')
    const ids = [await hold(db, { expiresOn: '2026-12-05' }), await hold(db, { personId: 'ines', expiresOn: '2026-12-05' })]
    expect(await sendReminders(sam, ids)).toEqual({ queued: 2, withoutEmail: [{ personId: 'ines', name: 'Inés Quispe' }] })
    await sendReminders(sam, [...ids].reverse())
    expect((await mail()).map(row => row.recipient)).toEqual(['fay@test.example', 'hal@test.example'])
  })

  test('refuses an unknown credential and one that never expires, and queues nothing', async () => {
    const sam = await workOf(db, 'sam')
    await expect(sendReminders(sam, ['nothing'])).rejects.toMatchObject({ kind: 'notFound' })
    await expect(sendReminders(sam, [await hold(db, { type: 'ladders' })])).rejects.toMatchObject({ kind: 'unprocessable' })
    expect(await mail()).toEqual([])
  })
})

describe('paper strips', () => {
  test('say in each person\'s own language what ends, one strip a person, and are not there when nothing ends', async () => {
    await db('people').where({ id: 'ines' }).update({ language: 'es' })
    await hold(db, { expiresOn: '2026-12-20' })
    await hold(db, { type: 'ladders', expiresOn: '2026-11-28' })
    await hold(db, { personId: 'ines', expiresOn: '2027-01-10' })
    const [first] = await pagesOf(new Uint8Array(await printStrips(await workOf(db, 'sam'), { within: 60 })))
    for (const words of ['Hal Hand', 'First aid and CPR: Sun, Dec 20, 2026 (19 days left)', 'Ladders: Sat, Nov 28, 2026 (3 days ago)', 'Inés Quispe', 'Primeros auxilios y RCP: dom, 10 de ene de 2027 (quedan 40 días)']) expect(first).toContain(words)
    const crew = await pagesOf(new Uint8Array(await printStrips(await workOf(db, 'fay'), { within: 60 })))
    expect(crew.join('')).not.toContain('Quispe')
    await expect(printStrips(await workOf(db, 'fay'), { within: 60, site: 'nowhere' })).rejects.toMatchObject({ kind: 'notFound' })
  })
})
