import type { Db } from './database'

/** Safety managers with an e-mail address who still work here: they get each sheet's hash. */
export const listManagersToTell = (db: Db): Promise<{ id: string, email: string, language: string }[]> =>
  db('people').where({ role: 'safety' }).whereNull('leftOn').whereNotNull('email').orderBy('id').select('id', 'email', 'language')
