import { randomUUID } from 'node:crypto'
import { moduleBySlug } from '#shared/domain/curriculum'
import { type NearMissKind, nearMissKinds, usualRetraining } from '#shared/domain/near-misses'
import { isCountingOn } from '#shared/domain/validity'
import type { RetrainingBody, RetrainingRulesView, RetrainingView } from '#shared/schemas/retraining'
import { appendAudit } from '../data/audit'
import { listModuleCredentialsOf } from '../data/crew-wall'
import type { Db } from '../data/database'
import { listNearMisses } from '../data/near-misses'
import { insertRetraining, listRetrainings, mapRetrainingRules, saveRetrainingRule } from '../data/retraining'
import { withdrawCredential } from './credentials'
import { inviteToModules } from './crewing'
import { badField, notFound, Refusal } from './refusal'
import { expectedPeople } from './roster'
import type { Work } from './work'

const modulesFor = async (db: Db, kind: NearMissKind) => (await mapRetrainingRules(db)).get(kind) ?? [...usualRetraining[kind]]

/** What each kind of report proposes to learn again. */
export async function readRetrainingRules(work: Work): Promise<RetrainingRulesView> {
  const own = await mapRetrainingRules(work.db)
  return { items: nearMissKinds.map(kind => ({ kind, modules: own.get(kind) ?? [...usualRetraining[kind]] })) }
}

/** Changes what a kind proposes. 422 for what is no module of the wall. */
export async function changeRetrainingRule(work: Work, kind: NearMissKind, modules: readonly string[]): Promise<RetrainingRulesView> {
  if (modules.some(slug => !moduleBySlug(slug))) throw badField('modules', 'holds no module of the wall')
  await work.db.transaction(async (trx) => {
    const before = await modulesFor(trx, kind)
    await saveRetrainingRule(trx, { kind, modules: [...new Set(modules)], changedBy: work.actor.personId, changedAt: work.now })
    await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'retrainingRule.changed', subject: { kind: 'company', id: '1' }, before: { kind, modules: before }, after: { kind, modules } })
  })
  return readRetrainingRules(work)
}

async function requireReport(db: Db, id: string) {
  const [report] = await listNearMisses(db, { id })
  if (!report) throw notFound('report')
  return report
}

async function countingOf(work: Work, personIds: readonly string[], modules: readonly string[]) {
  return (await listModuleCredentialsOf(work.db, personIds)).filter(credential => modules.includes(credential.module) && isCountingOn(credential, work.today))
}

/** What a report proposes: its kind's modules, and who was rostered at the site that day. Decides nothing. 404 for no such report. */
export async function readRetraining(work: Work, id: string): Promise<RetrainingView> {
  const report = await requireReport(work.db, id)
  const modules = await modulesFor(work.db, report.kind)
  const people = await expectedPeople(work.db, report.siteId, report.happenedOn)
  const held = await countingOf(work, people.map(person => person.id), modules)
  return {
    modules,
    people: people.map(({ id: personId, name }) => ({ personId, name, holds: [...new Set(held.filter(one => one.personId === personId).map(one => one.module))] })),
    decided: (await listRetrainings(work.db, id)).map(({ personId, name, module, credentialId, decidedAt, isDone }) => ({ personId, name, module, ended: credentialId !== null, decidedAt, isDone })),
  }
}

/**
 * The safety manager's decision: these people learn these modules again and are invited by mail; where it `ends` the
 * credential, that is taken back today with the report as its reason. 409 for what was decided before, 404 for no
 * such report or person, 422 for what is no module.
 */
export async function decideRetraining(work: Work, id: string, { steps, ends }: RetrainingBody): Promise<RetrainingView> {
  const report = await requireReport(work.db, id)
  const known = await listRetrainings(work.db, id)
  const pairs = steps.flatMap(({ personId, modules }) => [...new Set(modules)].map(module => ({ personId, module })))
  for (const { personId, module } of pairs) {
    if (!moduleBySlug(module)) throw badField('steps', 'holds no module of the wall')
    if (known.some(one => one.personId === personId && one.module === module)) throw new Refusal('conflict', 'alreadyDecided', { message: 'This was decided already for one of them' })
  }
  await inviteToModules(work, { steps })
  const held = ends ? await countingOf(work, pairs.map(pair => pair.personId), pairs.map(pair => pair.module)) : []
  for (const { personId, module } of pairs) {
    const credentials = held.filter(one => one.personId === personId && one.module === module)
    for (const credential of credentials) await withdrawCredential(work, credential.id, { reason: `Report ${id} of ${report.happenedOn} at ${report.site}: ${report.kind}` })
    await work.db.transaction(async (trx) => {
      await insertRetraining(trx, { id: randomUUID(), nearMissId: id, personId, module, credentialId: credentials[0]?.id ?? null, decidedBy: work.actor.personId, decidedAt: work.now })
      await appendAudit(trx, { at: work.now, actorId: work.actor.personId, action: 'nearMiss.retraining', subject: { kind: 'nearMiss', id }, after: { personId, module, ended: credentials.length > 0 } })
    })
  }
  return readRetraining(work, id)
}
