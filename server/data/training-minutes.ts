import { randomUUID } from 'node:crypto'
import type { TrainingKind } from '#shared/domain/training-minutes'
import type { Db } from './database'

/** Minutes of required training of one person, as counted. */
export interface TrainingMinutes {
  personId: string
  module: string
  kind: TrainingKind
  lesson: string | null
  minutes: number
  /** The company's date. */
  doneOn: string
  doneAt: string
}

/** Counts minutes. */
export async function insertTrainingMinutes(db: Db, counted: TrainingMinutes): Promise<void> {
  await db('trainingMinutes').insert({ id: randomUUID(), ...counted })
}

/** When a person's reading of a lesson was last counted, or null. */
export async function findLastCounted(db: Db, { personId, module, lesson }: { personId: string, module: string, lesson: string }): Promise<string | null> {
  const row = await db('trainingMinutes').where({ personId, module, lesson, kind: 'lesson' }).orderBy('doneAt', 'desc').first('doneAt')
  return row?.doneAt ?? null
}

/** One line of the report: a person, a day, a module, a kind. */
export interface TrainingLine {
  personId: string
  name: string
  badge: string
  employer: string
  crew: string | null
  doneOn: string
  module: string
  kind: TrainingKind
  minutes: number
}

/** Counted minutes between two dates, both included, summed by person, day, module and kind; by name and day. */
export async function listTrainingLines(db: Db, { from, to, personId }: { from: string, to: string, personId?: string }): Promise<TrainingLine[]> {
  return db('trainingMinutes').join('people', 'people.id', 'trainingMinutes.personId').leftJoin('crews', 'crews.id', 'people.crewId')
    .whereBetween('doneOn', [from, to]).modify(query => personId !== undefined && query.where('people.id', personId))
    .groupBy('people.id', 'doneOn', 'module', 'kind').orderBy(['people.sortName', 'people.id', 'doneOn', 'module', 'kind'])
    .select('people.id as personId', 'people.name', 'people.badge', 'people.employer', 'crews.name as crew', 'doneOn', 'module', 'kind').sum('minutes as minutes') as Promise<TrainingLine[]>
}
