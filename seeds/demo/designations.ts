import { addDays } from '../../shared/domain/dates'
import { type DemoContext, insertAll, instantAt, recordedAt, weekdayOnOrBefore } from './context'
import { hiredOn, personId } from './people'
import { demoId } from './random'
import { personByKey } from './roster'
import { type SiteKey, siteId } from './sites-and-crews'
import { assessorsNamedDaysAgo, held } from './story'

type Naming = [key: string, kind: 'competent' | 'assessor' | 'trainer', subject: string, site: SiteKey | null, authority: string]

const mayStop = 'May stop the work and have it put right before anyone goes on'
const maySign = 'May sign off the hands-on of this module'

const namings: readonly Naming[] = [
  ['zamora', 'assessor', 'stacking', null, maySign],
  ['zamora', 'assessor', 'running-bond', null, maySign],
  ['kowalczyk', 'assessor', 'stacking', null, maySign],
  ['kowalczyk', 'assessor', 'running-bond', null, maySign],
  ['tran', 'assessor', 'stacking', null, maySign],
  ['tran', 'assessor', 'running-bond', null, maySign],
  ['zamora', 'competent', 'scaffold', 'sagebrush', mayStop],
  ['zamora', 'competent', 'forms', 'sagebrush', mayStop],
  ['arriaga', 'competent', 'excavation', 'sagebrush', mayStop],
  ['begaye', 'competent', 'fall', 'sagebrush', mayStop],
  ['begaye', 'competent', 'fall', 'quarry', mayStop],
  ['kowalczyk', 'competent', 'scaffold', 'quarry', mayStop],
  ['boyd', 'competent', 'forms', 'quarry', mayStop],
  ['vasquez', 'competent', 'fall', 'linden', mayStop],
  ['vasquez', 'competent', 'fall', 'depot', mayStop],
  ['tran', 'competent', 'scaffold', 'linden', mayStop],
  ['lindqvist', 'competent', 'forms', 'depot', mayStop],
  ['solheim', 'competent', 'silica', null, 'Keeps the written exposure plan and may stop the cutting'],
  ['solheim', 'trainer', 'stacking', null, 'Answers learners\' questions'],
  ['begaye', 'trainer', 'running-bond', null, 'Answers learners\' questions'],
]

async function seedHold(context: DemoContext): Promise<void> {
  const startsOn = addDays(context.today, -held.daysAgo)
  const row = { id: demoId('hold'), personId: personId(personByKey(held.key)), startsOn, endsOn: null, reason: held.reason, createdBy: personId(personByKey('solheim')), createdAt: instantAt(startsOn, 14, 20) }
  await context.knex('holds').insert(row)
  context.audit.push({ at: row.createdAt, actorId: row.createdBy, action: 'hold.created', subject: { kind: 'hold', id: row.id }, after: { personId: row.personId, from: startsOn } })
}

/** Who is named in writing for what, and the one person on hold. */
export async function seedDesignations(context: DemoContext): Promise<void> {
  const rows = namings.map(([key, kind, subject, site, authority]) => {
    const named = personByKey(key)
    const earliest = kind === 'assessor' ? weekdayOnOrBefore(addDays(context.today, -assessorsNamedDaysAgo)) : addDays(context.monday, -104 * 7)
    const settled = addDays(hiredOn(context, named), 90)
    const startsOn = settled > earliest ? settled : earliest
    return {
      id: demoId(`designation ${key} ${kind} ${subject} ${site}`), personId: personId(named), kind, subject, siteId: site ? siteId(site) : null,
      authority, startsOn, endsOn: null, createdAt: recordedAt(context, startsOn),
    }
  })
  await insertAll(context.knex, 'designations', rows)
  for (const { id, createdAt, personId: person, kind, subject } of rows) {
    context.audit.push({ at: createdAt, actorId: personId(personByKey('solheim')), action: 'designation.created', subject: { kind: 'designation', id }, after: { personId: person, kind, subject } })
  }
  await seedHold(context)
}
