import { z } from 'zod'
import { briefingStates } from '../domain/states'
import { bilingual } from './talk'

const ownBriefing = z.object({ id: z.string(), siteCode: z.string(), siteName: z.string(), date: z.string(), talkTitle: bilingual, state: z.enum(briefingStates), isSigned: z.boolean() })

/** A hand's day: where they are rostered, today's briefings there, and sealed talks of the last week that they missed. */
export const myDayView = z.object({
  sites: z.array(z.object({ id: z.string(), code: z.string(), name: z.string(), date: z.string() })),
  today: z.array(ownBriefing),
  missed: z.array(ownBriefing),
})
export type MyDayView = z.infer<typeof myDayView>
