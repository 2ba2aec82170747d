import { auditList, auditQuery } from '#shared/schemas/audit'
import { readAudit } from '../../services/audit'

export default defineRoute({ summary: 'Who changed what, the newest first', ability: 'audit.read', query: auditQuery, answer: auditList }, ({ work, query }) => readAudit(work, query))
