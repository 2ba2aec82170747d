import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '../../../server/data/database'
import { mergePerson } from '../../../server/services/merge-people'
import { at, hold, openCredentialCompany, workOf } from '../../support/credential-company'

let db: Db
const ada = () => workOf(db, 'ada')
beforeEach(async () => {
  db = await openCredentialCompany()
  await hold(db, { personId: 'ines', type: 'ladders' })
  await hold(db, { personId: 'ines', expiresOn: '2027-05-01' })
  await hold(db, { personId: 'hal', type: 'ladders' })
  for (const [personId, language] of [['ines', 'es'], ['hal', 'en']] as const) await db('lessonReads').insert({ personId, language, module: 'stacking', lesson: 'one', firstReadAt: at, lastReadAt: at })
  await db('people').where({ id: 'ines' }).update({ email: 'ines@test.example', hiredOn: '2025-03-01', phone: '555 0199' })
  await db('sessions').insert({ id: 'session-of-ines', userId: 'ines', expiresAt: 2_000_000_000, via: 'badge', createdAt: 1_700_000_000 })
  return () => db.destroy()
})

describe('a person who stands in the list twice', () => {
  it('is counted first, and the count changes nothing', async () => {
    expect(await mergePerson(await ada(), 'ines', { into: 'hal' }, true)).toMatchObject({ from: { id: 'ines' }, into: { id: 'hal' }, moves: { credentials: 2 } })
    expect(await db('people').where({ id: 'ines' }).first('mergedInto', 'email')).toEqual({ mergedInto: null, email: 'ines@test.example' })
  })

  it('becomes one: cards, training and rosters move, what both have stays the survivor\'s, and the other entry leads nowhere', async () => {
    await mergePerson(await ada(), 'ines', { into: 'hal' }, false)
    expect(await db('credentials').where({ personId: 'hal' }).count({ n: '*' }).first()).toEqual({ n: 3 })
    expect(await db('credentials').where({ personId: 'ines' }).count({ n: '*' }).first()).toEqual({ n: 0 })
    expect(await db('lessonReads').where({ personId: 'hal', lesson: 'one' }).pluck('language')).toEqual(['en'])
    expect(await db('people').where({ id: 'ines' }).first('mergedInto', 'email', 'crewId', 'leftOn')).toEqual({ mergedInto: 'hal', email: null, crewId: null, leftOn: '2026-11-30' })
    expect(await db('people').where({ id: 'hal' }).first('email', 'phone', 'hiredOn', 'crewId')).toEqual({ email: 'hal@test.example', phone: '555 0199', hiredOn: '2025-03-01', crewId: 'north' })
    expect(await db('sessions').where({ userId: 'ines' }).first()).toBeUndefined()
    expect(await db('audit').where({ action: 'person.merged' }).first('subjectId')).toEqual({ subjectId: 'ines' })
    await expect(mergePerson(await ada(), 'ines', { into: 'fay' }, false)).rejects.toMatchObject({ code: 'alreadyMerged' })
    await expect(mergePerson(await ada(), 'fay', { into: 'ines' }, false)).rejects.toMatchObject({ code: 'alreadyMerged' })
  })

  it('is refused for a manager, oneself, the same entry and nobody', async () => {
    await expect(mergePerson(await ada(), 'sam', { into: 'hal' }, false)).rejects.toMatchObject({ code: 'guardedMerge' })
    await expect(mergePerson(await ada(), 'ada', { into: 'hal' }, false)).rejects.toMatchObject({ code: 'guardedMerge' })
    await expect(mergePerson(await ada(), 'hal', { into: 'hal' }, false)).rejects.toMatchObject({ code: 'samePerson' })
    await expect(mergePerson(await ada(), 'hal', { into: 'nobody' }, false)).rejects.toMatchObject({ code: 'unknownPerson' })
    await expect(mergePerson(await ada(), 'nobody', { into: 'hal' }, false)).rejects.toMatchObject({ kind: 'notFound' })
  })

  it('moves every table that names a person as its own: none that a migration made is forgotten', async () => {
    const moved = ['credentials', 'lesson_reads', 'attempts', 'sign_off_requests', 'sign_offs', 'training_minutes', 'assessor_talks', 'retrainings', 'sign_ins', 'assignments', 'duty_days', 'designations', 'holds', 'renewal_seats', 'trainer_questions']
    const leftBehind = ['sign_in_secrets', 'links', 'mail', 'calendar_links']
    const tables: { name: string }[] = await db.raw('SELECT name FROM sqlite_master WHERE type = \'table\'')
    const owning: string[] = []
    for (const { name } of tables) {
      const columns: { name: string }[] = await db.raw(`PRAGMA table_info(${name})`)
      if (columns.some(column => column.name === 'person_id' || column.name === 'personId')) owning.push(name)
    }
    expect(owning.filter(name => ![...moved, ...leftBehind].includes(name)).sort()).toEqual([])
  })
})
