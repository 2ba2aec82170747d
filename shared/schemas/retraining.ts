import { z } from 'zod'
import { nearMissKinds } from '../domain/near-misses'
import { code, id } from './common'

export const retrainingRulesView = z.object({ items: z.array(z.object({ kind: z.enum(nearMissKinds), modules: z.array(z.string()) })) })
export type RetrainingRulesView = z.infer<typeof retrainingRulesView>
export const retrainingRuleParams = z.strictObject({ kind: z.enum(nearMissKinds) })
export const retrainingRuleBody = z.strictObject({ modules: z.array(code).max(16) })

/** What a report proposes, who was at the site that day, and what was decided. */
export const retrainingView = z.object({
  modules: z.array(z.string()),
  people: z.array(z.object({
    personId: z.string(), name: z.string(),
    /** The modules of those proposed that they hold now, whose credential a decision may end. */
    holds: z.array(z.string()),
  })),
  decided: z.array(z.object({ personId: z.string(), name: z.string(), module: z.string(), ended: z.boolean(), decidedAt: z.string(), isDone: z.boolean() })),
})
export type RetrainingView = z.infer<typeof retrainingView>
/** Who learns what again; `ends` takes the module's credential back today, with the report named as the reason. */
export const retrainingBody = z.strictObject({ steps: z.array(z.strictObject({ personId: id, modules: z.array(code).min(1).max(16) })).min(1).max(200), ends: z.boolean() })
export type RetrainingBody = z.infer<typeof retrainingBody>
