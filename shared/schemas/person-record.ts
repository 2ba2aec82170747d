import { z } from 'zod'
import { moduleStates, signInMethods } from '../domain/states'
import { bilingual } from './talk'

/** One person's wall and last sign-ins, for who leads them. */
export const personRecordView = z.object({
  wall: z.array(z.object({ slug: z.string(), shortTitle: z.string(), course: z.number().int(), left: z.number().int(), state: z.enum(moduleStates) })),
  /** The latest first, at most 60. */
  signIns: z.array(z.object({ briefingId: z.string(), date: z.string(), site: z.string(), talkTitle: bilingual, method: z.enum(signInMethods), late: z.boolean() })),
})
export type PersonRecordView = z.infer<typeof personRecordView>
