import { invitationBody, invitationView } from '#shared/schemas/crewing'
import { inviteToModules } from '../../services/crewing'

export default defineRoute({
  summary: 'Invite people to the modules of a fix',
  ability: 'modules.invite', body: invitationBody, answer: invitationView,
}, ({ work, body }) => inviteToModules(work, body))
