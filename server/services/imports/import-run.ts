import { z } from 'zod'
import type { ImportAnswer, ImportQuery } from '#shared/schemas/imports'
import { keepChosenColumns, listChosenColumns, type ImportKind } from '../../data/imports'
import { badField, Refusal } from '../refusal'
import type { Work } from '../work'
import { mapColumns, nameCells, plainHeader, type MappedTable, type Meanings, type NamedRow } from './columns'
import { tellerOf, type Tell } from './progress'
import { readRows } from './read-table'
import { readWrittenDate } from './written-dates'

/** Why a row is not taken: a word that screens translate, and what it means in English. */
export const reasons = {
  ambiguousDate: 'could be two dates: tell the order of day and month',
  notADate: 'is not a date',
  surplusCells: 'has more cells than the header',
  notARole: 'is not a role',
  notALanguage: 'must be en or es',
  notAnEmployerKind: 'must be own, temp, sub or visitor',
  notAnAddress: 'must be an e-mail address',
  otherBadge: 'belongs to another badge',
  guardedRole: 'is given on the person\'s own page, with the password',
  ownRole: 'nobody changes their own role',
  nameNeeded: 'is needed for a new person',
  badgeNeeded: 'is needed for a new person',
  personTwice: 'the same person stands in the file before',
  unknownCrew: 'is not a crew',
  leftBeforeHired: 'is before the first day',
  personNeeded: 'badge or e-mail is needed',
  nobody: 'nobody has it',
  unknownType: 'is not a credential type',
  byModuleOnly: 'is only issued by passing its module',
  unknownSite: 'is not a site',
  siteNeeded: 'this type counts at one site: name it',
  printedNeeded: 'the date printed on the card is needed',
  printedRefused: 'is computed from the type; leave it empty',
  expiresBeforeIssue: 'is before the date of issue',
  cardTwice: 'the same card stands in the file before',
  judgedAlready: 'this card was judged already and differs; add the new card instead',
  needed: 'is needed',
  badValue: 'can\'t be taken',
} as const
export type Reason = keyof typeof reasons

export interface Wrong { field: string, code: Reason }
/** What one row comes to. */
export type Judged<Plan> = { plan: Plan } | { unchanged: true } | Wrong

export const wrong = (field: string, code: Reason): Wrong => ({ field, code })

/** A date in a cell, in the order that the sender told. */
export const dateCell = (order: ImportQuery['dateOrder']) => z.string().transform((text, context) => {
  const read = readWrittenDate(text, order)
  if ('date' in read) return read.date
  context.addIssue({ code: 'custom', message: read.problem === 'dateOrder' ? 'ambiguousDate' : 'notADate' })
  return z.NEVER
})

/** Checks a row's cells with the schema; the first thing that is wrong rejects it. Messages of the schema are reasons. */
export function readRow<Row>(schema: z.ZodType<Row>, row: NamedRow): { value: Row } | Wrong {
  if (row.surplus) return wrong('row', 'surplusCells')
  const parsed = schema.safeParse(row.values)
  if (parsed.success) return { value: parsed.data }
  const issue = parsed.error.issues[0]!
  const field = String(issue.path[0] ?? 'row')
  if (issue.message in reasons) return wrong(field, issue.message as Reason)
  if (field === 'email') return wrong(field, 'notAnAddress')
  return wrong(field, row.values[field] === undefined ? 'needed' : 'badValue')
}

/** What somebody said for this file: plain header → field, null for "not used". Throws 422 for what is no such thing. */
function chosenIn({ columns }: ImportQuery, { synonyms }: Pick<Meanings, 'synonyms'>): Map<string, string | null> {
  if (!columns) return new Map()
  const shape = z.record(z.string().max(300), z.enum(['', ...Object.keys(synonyms)]))
  try {
    return new Map(Object.entries(shape.parse(JSON.parse(columns))).map(([header, field]) => [plainHeader(header), field || null]))
  }
  catch {
    throw badField('columns', 'must be a JSON object of header and field')
  }
}

export interface ImportKindOf<Plan> {
  kind: ImportKind
  meanings: Omit<Meanings, 'chosen'>
  /** Judges rows one by one, in the order of the file. */
  judge: (row: NamedRow) => Judged<Plan>
  isNew: (plan: Plan) => boolean
  /** Saves everything in one transaction, and what else belongs to it through `also`. */
  save: (plans: Plan[], tell: Tell) => Promise<void>
}

/** Reads the file and finds its header, by what was chosen for it, chosen before, or usual. */
export async function openImport(work: Work, bytes: Buffer, query: ImportQuery, { kind, meanings }: Pick<ImportKindOf<never>, 'kind' | 'meanings'>): Promise<MappedTable> {
  const chosen = chosenIn(query, meanings)
  const remembered = await listChosenColumns(work.db, kind)
  return mapColumns(await readRows(bytes), { ...meanings, chosen: new Map([...remembered, ...chosen]) })
}

/**
 * Runs an import over a mapped table: judges each row, then saves all or nothing. With rejected rows nothing is saved
 * unless they may be skipped; then 422 with the whole answer. What was chosen for columns is remembered once saved.
 */
export async function runImport<Plan>(work: Work, table: MappedTable, query: ImportQuery, { kind, meanings, judge, isNew, save }: ImportKindOf<Plan>): Promise<ImportAnswer> {
  const tell = tellerOf(work.actor.personId, query.key)
  const [plans, rejected]: [Plan[], ImportAnswer['rejected']] = [[], []]
  let unchanged = 0
  for (const [index, row] of nameCells(table).entries()) {
    const judged = judge(row)
    if ('plan' in judged) plans.push(judged.plan)
    else if ('unchanged' in judged) unchanged += 1
    else rejected.push({ row: row.number, ...judged, why: reasons[judged.code] })
    await tell('checking', index + 1, table.rows.length)
  }
  const created = plans.filter(isNew).length
  const answer: ImportAnswer = { rows: table.rows.length, created, updated: plans.length - created, unchanged, rejected, mapping: table.mapping, fields: Object.keys(meanings.synonyms), asksDateOrder: rejected.some(row => row.code === 'ambiguousDate') }
  if (query.dryRun) return answer
  if (rejected.length > 0 && !query.skipRejected) throw new Refusal('unprocessable', 'rejectedRows', { message: `${rejected.length} rows can't be taken; nothing was saved`, data: { ...answer, created: 0, updated: 0 } })
  if (plans.length > 0) await save(plans, tell)
  await keepChosenColumns(work.db, kind, chosenIn(query, meanings), work.now)
  return answer
}
