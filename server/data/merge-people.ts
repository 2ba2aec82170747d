import type { Db } from './database'

/** What belongs to a person's own record, by table and column, in the words of a preview. */
const owned = {
  credentials: [['credentials', 'personId']],
  training: [['lessonReads', 'personId'], ['attempts', 'personId'], ['signOffRequests', 'personId'], ['signOffs', 'personId'], ['trainingMinutes', 'personId'], ['assessorTalks', 'personId'], ['retrainings', 'personId']],
  signIns: [['signIns', 'personId']],
  work: [['assignments', 'personId'], ['dutyDays', 'personId'], ['designations', 'personId'], ['holds', 'personId'], ['renewalSeats', 'personId']],
  other: [['files', 'ownerId'], ['nearMisses', 'reporterId'], ['trainerQuestions', 'personId']],
} as const
export type MergeCounts = Record<keyof typeof owned, number>

/** How many rows of each kind a person owns. */
export async function countOwned(db: Db, personId: string): Promise<MergeCounts> {
  const counts = { credentials: 0, training: 0, signIns: 0, work: 0, other: 0 }
  for (const [kind, places] of Object.entries(owned)) {
    for (const [table, column] of places) counts[kind as keyof MergeCounts] += Number((await db(table).where({ [column]: personId }).count({ n: '*' }).first())!.n)
  }
  return counts
}

/**
 * Gives everything that one person owns to another. Where both have the same (the same lesson read, the same briefing
 * signed), the other's stays and the row remains with the one given up. Ways to sign in and links end.
 */
export async function moveOwned(trx: Db, from: string, to: string): Promise<void> {
  for (const [table, column] of Object.values(owned).flat()) {
    const names = { table: toSnake(table), column: toSnake(column) }
    await trx.raw(`UPDATE OR IGNORE ${names.table} SET ${names.column} = ? WHERE ${names.column} = ?`, [to, from])
  }
  for (const [table, column] of [['sessions', 'userId'], ['links', 'personId'], ['signInSecrets', 'personId']] as const) await trx(table).where({ [column]: from }).del()
  await trx('crews').where({ foremanId: from }).update({ foremanId: to })
  await trx('sites').where({ superintendentId: from }).update({ superintendentId: to })
}
const toSnake = (name: string) => name.replace(/[A-Z]/g, letter => `_${letter.toLowerCase()}`)

/** Marks an entry as given up: it left, leads nowhere, and points at the one that stays. Its badge stays its own. */
export async function markMerged(trx: Db, { from, to, leftOn, now }: { from: string, to: string, leftOn: string, now: string }): Promise<void> {
  await trx('people').where({ id: from }).update({ mergedInto: to, leftOn, email: null, crewId: null, version: trx.raw('version + 1'), updatedAt: now })
}
