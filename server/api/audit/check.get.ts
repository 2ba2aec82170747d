import { auditCheckView } from '#shared/schemas/audit'
import { checkAudit } from '../../services/audit'

export default defineRoute({ summary: 'Recompute the chain of the audit trail', ability: 'audit.read', answer: auditCheckView }, ({ work }) => checkAudit(work))
