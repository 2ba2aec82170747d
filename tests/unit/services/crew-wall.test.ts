import { beforeEach, describe, expect, it } from 'vitest'
import type { Db } from '~~/server/data/database'
import { readCrewWall } from '~~/server/services/crew-wall'
import { Refusal } from '~~/server/services/refusal'
import { makeAssessor, openLearningCompany, workAfter } from '../../support/learning-company'

let db: Db
beforeEach(async () => {
  db = await openLearningCompany()
  await db('crews').insert({ id: 'walls', name: 'Walls', foremanId: 'frank', createdAt: '2026-01-05T14:00:00.000Z' })
  await db('people').whereIn('id', ['nora', 'olek', 'frank']).update({ crewId: 'walls' })
})

describe('a crew\'s wall', () => {
  it('counts who holds each block in date, names who is missing and whose ends soon', async () => {
    await makeAssessor(db, 'frank', 'stacking')
    await makeAssessor(db, 'nora', 'stacking', { expiresOn: '2026-12-20' })
    await makeAssessor(db, 'olek', 'stacking', { expiresOn: '2026-11-30' })
    const wall = await readCrewWall(await workAfter(db, 'frank', 0, 'foreman'), { crewId: 'walls', language: 'en' })
    expect(wall).toMatchObject({ people: 3, crew: { name: 'Walls' } })
    expect(wall.blocks).toHaveLength(16)
    expect(wall.blocks.find(block => block.slug === 'stacking')).toMatchObject({ held: 2, isThin: false, missing: ['Person olek'], dueSoon: ['Person nora'] })
    expect(wall.blocks.find(block => block.slug === 'steel')).toMatchObject({ held: 0, isThin: true, missing: ['Person frank', 'Person nora', 'Person olek'] })
  })

  it('leaves out who left, on the day they left', async () => {
    await db('people').where({ id: 'olek' }).update({ leftOn: '2026-12-01' })
    expect((await readCrewWall(await workAfter(db, 'sara', 0, 'safety'), { crewId: 'walls', language: 'es' })).people).toBe(2)
  })

  it('is not there for a foreman of another crew', async () => {
    await expect(readCrewWall(await workAfter(db, 'olek', 0, 'foreman'), { crewId: 'walls', language: 'en' })).rejects.toThrow(Refusal)
  })
})
