import { addDays, dayOfWeek } from '../../shared/domain/dates'
import { type DemoContext, insertAll } from './context'
import { personId, worksOn } from './people'
import { createRandom } from './random'
import { type CrewKey, hasSkill, type Skill } from './roster'
import { crewMembers, siteId, siteOfCrew } from './sites-and-crews'

const dutyOfSkill: Partial<Record<Skill, string>> = { h: 'hose-hand', v: 'vibrator-hand', w: 'wall-watcher', p: 'pump-spotter', l: 'pour-lead' }

/** The days on which a crew poured, oldest first: about one a week, the last one some days ago. */
function pourDatesOf(context: DemoContext, crew: CrewKey): string[] {
  const random = createRandom(`pours ${crew}`)
  const dates: string[] = []
  for (let date = addDays(context.today, -720); date <= addDays(context.today, -4); date = addDays(date, random.between(5, 10))) {
    if (dayOfWeek(date) <= 5 && siteOfCrew(context, crew, date)) dates.push(date)
  }
  return dates
}

/** Who did what at each pour, so that the pour duties' recent practice stands. People who can do two duties take turns. */
export async function seedPourDays(context: DemoContext): Promise<void> {
  const duties = new Map<string, string>((await context.knex('duties').select('id', 'code')).map(row => [row.code, row.id]))
  const rows = (['pour', 'prairie-pour'] as const).flatMap(crew => pourDatesOf(context, crew).flatMap((doneOn, turn) =>
    crewMembers(crew).filter(one => worksOn(context, one, doneOn)).flatMap((one, place) => {
      const able = (Object.keys(dutyOfSkill) as Skill[]).filter(skill => hasSkill(one, skill))
      const skill = able[(turn + place) % Math.max(1, able.length)]
      const site = siteOfCrew(context, crew, doneOn)
      return skill && site ? [{ personId: personId(one), dutyId: duties.get(dutyOfSkill[skill] ?? ''), doneOn, siteId: siteId(site) }] : []
    })))
  await insertAll(context.knex, 'dutyDays', rows)
}
