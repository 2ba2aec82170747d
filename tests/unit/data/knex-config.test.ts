import { expect, it } from 'vitest'
import { insertTestPerson, openTestDatabase } from '../../support/work'

it('a plucked column is found by its name in code, inside a transaction too (there it used to give undefined)', async () => {
  const db = await openTestDatabase()
  await insertTestPerson(db, { id: 'nora', sortName: 'Nora' })
  expect(await db('people').pluck('sortName')).toEqual(['Nora'])
  expect(await db.transaction(trx => trx('people').pluck('sortName'))).toEqual(['Nora'])
  await db.destroy()
})
