import { isCountingOn } from '#shared/domain/validity'
import { findLearner, listAssessorDesignations, listSitesOfPerson } from '../data/assessors'
import type { Db } from '../data/database'
import { listModuleCredentials } from '../data/module-credentials'
import { notFound, Refusal } from './refusal'
import type { Teaching } from './teaching'
import type { Work } from './work'

/** Where somebody may assess a module: nowhere when it is missing, everywhere (`'all'`), or at these sites. */
export type AssessedModules = ReadonlyMap<string, 'all' | ReadonlySet<string>>

/**
 * The modules that the actor may sign off today: the safety manager all of them; others those they are designated
 * assessor of in writing, for as long as they hold the module's credential in date themselves.
 */
export async function assessedModules(db: Db, work: Work, teaching: Teaching): Promise<AssessedModules> {
  const { actor, today } = work
  if (actor.role === 'safety') return new Map([...teaching.keys()].map(slug => [slug, 'all']))
  const held = new Set((await listModuleCredentials(db, actor.personId)).filter(credential => isCountingOn(credential, today)).map(credential => credential.module))
  const assessed = new Map<string, 'all' | Set<string>>()
  for (const { module, siteId } of await listAssessorDesignations(db, actor.personId, today)) {
    const before = assessed.get(module)
    if (!held.has(module) || before === 'all') continue
    assessed.set(module, siteId === null ? 'all' : new Set([...before ?? [], siteId]))
  }
  return assessed
}

/** True when somebody who assesses at these sites may assess this person on the date. */
export async function isReached(db: Db, sites: 'all' | ReadonlySet<string> | undefined, personId: string, today: string): Promise<boolean> {
  if (sites === undefined || sites === 'all') return sites === 'all'
  return (await listSitesOfPerson(db, personId, today)).some(siteId => sites.has(siteId))
}

/**
 * The learner whom the actor may assess in this module, otherwise: 404 for no such module or person, 403
 * `ownSignOff` and `notAssessor`, 422 `notEmployed`.
 */
export async function requireAssessable(db: Db, work: Work, teaching: Teaching, { personId, module }: { personId: string, module: string }): Promise<{ id: string, name: string }> {
  if (!teaching.has(module)) throw notFound('module')
  const learner = await findLearner(db, personId, work.today)
  if (!learner) throw notFound('person')
  if (learner.id === work.actor.personId) throw new Refusal('forbidden', 'ownSignOff', { message: 'Nobody assesses themselves' })
  const assessed = await assessedModules(db, work, teaching)
  if (!await isReached(db, assessed.get(module), learner.id, work.today)) throw new Refusal('forbidden', 'notAssessor', { message: 'Only an assessor of this module who holds it in date may do this' })
  if (!learner.isEmployed) throw new Refusal('unprocessable', 'notEmployed', { message: 'This person does not work here today', fields: { personId: 'does not work here today' } })
  return learner
}
