import { z } from 'zod'
import { clearanceStates, missingReasons, workTags } from '../domain/states'
import { date } from './common'
import { bilingual, suggestionView, workList } from './talk'
import { briefingListItem } from './briefing'
import { weatherQuery } from './weather'

export const todayQuery = z.strictObject({ date: date.optional(), work: workList, ...weatherQuery })

const fix = z.object({ kind: z.string() }).loose()
export const todayMissing = z.object({ anyOf: z.array(z.string()), why: z.object({ kind: z.enum(missingReasons), type: z.string().optional(), on: z.string().optional() }), fix })
export const todayDuty = z.object({ duty: z.string(), state: z.enum(clearanceStates), until: z.string().nullable(), missing: z.array(todayMissing) })
/** One person's morning; `state` is null when their crew has no duties to be cleared for. */
export const todayPerson = z.object({
  personId: z.string(), name: z.string(), crew: z.string().nullable(), state: z.enum(clearanceStates).nullable(),
  duties: z.array(todayDuty),
  /** What stops them today: the duties that lapsed, or the nearest one when they may do none. */
  stops: z.array(todayDuty),
})
export type TodayPerson = z.infer<typeof todayPerson>

export const todayView = z.object({
  site: z.object({ id: z.string(), code: z.string(), name: z.string(), timeZone: z.string() }),
  date: z.string(),
  expected: z.number().int(),
  cleared: z.number().int(),
  /** Of how many the headline speaks: those with duties to be cleared for. */
  asked: z.number().int(),
  people: z.array(todayPerson),
  dutyNames: z.record(z.string(), bilingual),
  typeNames: z.record(z.string(), bilingual),
  work: z.array(z.enum(workTags)),
  openBriefing: briefingListItem.nullable(),
  briefings: z.array(briefingListItem),
  lastTalks: z.array(z.object({ talk: z.string(), title: bilingual, date: z.string() })),
  suggestions: z.array(suggestionView),
  mayRun: z.boolean(),
  /** Named in writing as a competent person at this site today: may allow a card that is not verified yet for one shift. */
  mayAllow: z.boolean(),
})
export type TodayView = z.infer<typeof todayView>
