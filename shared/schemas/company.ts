import { z } from 'zod'
import { language, line, timeZone } from './common'

export const companyChanges = z.strictObject({ name: line(120).optional(), timeZone: timeZone.optional(), language: language.optional(), markAsked: z.enum(['tap', 'signature']).optional() })
export type CompanyChanges = z.infer<typeof companyChanges>
export const companyView = z.object({ name: z.string(), timeZone: z.string(), language, markAsked: z.enum(['tap', 'signature']), isDemo: z.boolean() })
