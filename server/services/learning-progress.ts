import { nextBlock, wallStates } from '#shared/domain/curriculum'
import { dateInZone } from '#shared/domain/dates'
import { isHalfFresh } from '#shared/domain/issuing'
import type { ModuleState } from '#shared/domain/states'
import { isCountingOn } from '#shared/domain/validity'
import { listTriedModules, listUnusedPasses } from '../data/attempts'
import type { Db } from '../data/database'
import { listLessonReads } from '../data/lesson-reads'
import { listModuleCredentials, type ModuleCredential } from '../data/module-credentials'
import type { Teaching } from './teaching'
import type { Work } from './work'

/** How far one person is with the whole wall. */
export interface Progress {
  states: ReadonlyMap<string, ModuleState>
  /** Slug of the block to go on with, or null. */
  next: string | null
  /** When each lesson was last read, by `module/lesson`. */
  reads: ReadonlyMap<string, string>
  credentials: readonly ModuleCredential[]
}

/**
 * One person's wall today. A passed quiz counts as passed for 90 days while no credential came of it; when the
 * credential that came of it has run out, the block is to be laid again.
 */
export async function progressOf(db: Db, work: Pick<Work, 'today' | 'company'>, teaching: Teaching, personId: string): Promise<Progress> {
  const { today, company } = work
  const reads = await listLessonReads(db, personId)
  const tried = new Set([...await listTriedModules(db, personId), ...reads.map(read => read.module)])
  const credentials = await listModuleCredentials(db, personId)
  const held = new Set(credentials.filter(credential => isCountingOn(credential, today)).map(credential => credential.module))
  const passes = await listUnusedPasses(db, [personId])
  const passed = new Set(passes.filter(pass => isHalfFresh({ doneOn: dateInZone(pass.submittedAt, company.timeZone) }, today)).map(pass => pass.module))
  const states = wallStates((slug) => {
    const taught = teaching.get(slug)
    const isHeld = held.has(slug)
    if (!taught) return { isWritten: false, hasChecklist: false, isStarted: false, isQuizPassed: false, isHeld }
    return { isWritten: true, hasChecklist: taught.text.en.checklist.length > 0, isStarted: tried.has(slug), isQuizPassed: passed.has(slug), isHeld }
  })
  return {
    states, credentials,
    next: nextBlock(states)?.slug ?? null,
    reads: new Map(reads.map(read => [`${read.module}/${read.lesson}`, read.lastReadAt])),
  }
}
