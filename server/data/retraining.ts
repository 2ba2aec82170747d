import type { NearMissKind } from '#shared/domain/near-misses'
import type { Db } from './database'

/** The company's own word on what a kind proposes, where it has one. */
export async function mapRetrainingRules(db: Db): Promise<Map<NearMissKind, string[]>> {
  const rows: { kind: NearMissKind, modules: string }[] = await db('retrainingRules').select('kind', 'modules')
  return new Map(rows.map(row => [row.kind, JSON.parse(row.modules) as string[]]))
}

/** Writes what a kind proposes; a later word takes the place of an earlier one. */
export async function saveRetrainingRule(db: Db, rule: { kind: NearMissKind, modules: readonly string[], changedBy: string, changedAt: string }): Promise<void> {
  await db('retrainingRules').insert({ ...rule, modules: JSON.stringify(rule.modules) }).onConflict('kind').merge()
}

export interface Retraining { id: string, nearMissId: string, personId: string, module: string, credentialId: string | null, decidedBy: string, decidedAt: string }

/** Keeps who learns what again because of a report. */
export const insertRetraining = (db: Db, row: Retraining): Promise<unknown> => db('retrainings').insert(row)

/** What was decided for a report, with names, and whether the module was passed since. */
export async function listRetrainings(db: Db, nearMissId: string): Promise<(Retraining & { name: string, isDone: boolean })[]> {
  const rows = await db('retrainings').join('people', 'people.id', 'retrainings.personId').where({ nearMissId }).orderBy(['people.sortName', 'module'])
    .select('retrainings.*', 'people.name')
    .select({ passed: db('attempts').whereRaw('attempts.person_id = retrainings.person_id and attempts.module = retrainings.module and attempts.passed = 1 and attempts.submitted_at > retrainings.decided_at').count() })
  return (rows as (Retraining & { name: string, passed: number })[]).map(({ passed, ...row }) => ({ ...row, isDone: passed > 0 }))
}
