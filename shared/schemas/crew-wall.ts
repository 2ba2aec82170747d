import { z } from 'zod'

/** How a crew stands on each block of the wall. */
export const crewWallView = z.object({
  crew: z.object({ id: z.string(), name: z.string() }), people: z.number().int(),
  blocks: z.array(z.object({
    slug: z.string(), title: z.string(), shortTitle: z.string(), course: z.number().int(), left: z.number().int(),
    held: z.number().int(), dueSoon: z.array(z.string()), missing: z.array(z.string()), isThin: z.boolean(),
  })),
})
export type CrewWallView = z.infer<typeof crewWallView>
