import { z } from 'zod'

/** The sites that concern somebody today: where they are rostered first, then those they lead. */
export const placesView = z.object({
  sites: z.array(z.object({ id: z.string(), code: z.string(), name: z.string(), timeZone: z.string(), date: z.string(), isRostered: z.boolean() })),
})
export type PlacesView = z.infer<typeof placesView>
