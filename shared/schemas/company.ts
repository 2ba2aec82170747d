import { z } from 'zod'
import { language, line, timeZone } from './common'

const clockTime = z.string().regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'must be a time like 06:00')
/** When required training is open, in the company's zone; days count from 1, Monday, to 7, Sunday. */
export const trainingHours = z.strictObject({ from: clockTime, to: clockTime, days: z.array(z.number().int().min(1).max(7)).min(1, 'choose a day').max(7) })
  .refine(hours => hours.from < hours.to, { path: ['to'], message: 'must be later than the start' })

export const companyChanges = z.strictObject({ name: line(120).optional(), timeZone: timeZone.optional(), language: language.optional(), markAsked: z.enum(['tap', 'signature']).optional(), trainingHours: trainingHours.nullable().optional(), textReminders: z.boolean().optional() })
export type CompanyChanges = z.infer<typeof companyChanges>
export const companyView = z.object({ name: z.string(), timeZone: z.string(), language, markAsked: z.enum(['tap', 'signature']), isDemo: z.boolean(), trainingHours: trainingHours.nullable(), textReminders: z.boolean() })
/** With the company's date. */
export const companyToday = companyView.extend({ today: z.string() })
