import { modules } from '#shared/domain/curriculum'
import { credentialStateOn, isCountingOn } from '#shared/domain/validity'
import type { Language } from '#shared/domain/states'
import type { CrewWallView } from '#shared/schemas/crew-wall'
import { listCrews } from '../data/crews'
import { listCrewMembers, listModuleCredentialsOf } from '../data/crew-wall'
import { isWithin } from '../data/reach'
import { notFound } from './refusal'
import type { Work } from './work'

/** A block is thin where fewer than this share of the crew holds it in date (company rule, no source). */
const THIN_BELOW = 0.5

/**
 * A crew's wall: for each block how many of the crew hold it in date, who is missing, and for whom it ends soon. 404 for
 * a crew that the actor does not lead.
 */
export async function readCrewWall(work: Work, { crewId, language }: { crewId: string, language: Language }): Promise<CrewWallView> {
  const { db, today } = work
  const [crew] = await listCrews(db, today, crewId)
  if (!crew || !isWithin((await work.reach()).crewIds, crewId)) throw notFound('crew')
  const members = await listCrewMembers(db, crewId, today)
  const held = await listModuleCredentialsOf(db, members.map(member => member.id))
  const named = (ids: ReadonlySet<string>) => members.filter(member => ids.has(member.id)).map(member => member.name)
  const blocks = modules.map((module) => {
    const counting = held.filter(credential => credential.module === module.slug && isCountingOn(credential, today))
    const holders = new Set(counting.map(credential => credential.personId))
    const inDate = new Set(counting.filter(credential => credentialStateOn(credential, credential, today) === 'inDate').map(credential => credential.personId))
    return {
      slug: module.slug, title: module.title[language], shortTitle: module.shortTitle[language], course: module.course, left: module.left,
      held: holders.size, dueSoon: named(new Set([...holders].filter(id => !inDate.has(id)))), missing: named(new Set(members.map(member => member.id).filter(id => !holders.has(id)))),
      isThin: members.length > 0 && holders.size / members.length < THIN_BELOW,
    }
  })
  return { crew: { id: crew.id, name: crew.name }, people: members.length, blocks }
}
