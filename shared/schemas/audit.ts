import { z } from 'zod'
import { date, id, line, listOf, paging } from './common'

/** Which rows: by what they are about, who did it, what was done, and the days (company zone), both included. */
export const auditQuery = z.strictObject({
  subjectKind: line(40).optional(), subjectId: id.optional(), actor: id.optional(), action: line(60).optional(),
  from: date.optional(), to: date.optional(), ...paging,
})
export type AuditQuery = z.infer<typeof auditQuery>

/** One row of the trail. `details` is null when it was erased as the law asks; its digest stays. */
export const auditView = z.object({
  seq: z.number().int(), at: z.string(), actorId: z.string().nullable(), actor: z.string().nullable(), action: z.string(),
  subject: z.object({ kind: z.string(), id: z.string(), name: z.string().nullable() }),
  details: z.object({ before: z.unknown(), after: z.unknown() }).nullable(), hash: z.string(),
})
export type AuditView = z.infer<typeof auditView>
export const auditList = listOf(auditView)
export const auditCheckView = z.object({ intact: z.boolean(), rows: z.number().int(), brokenAt: z.number().int().optional() })
