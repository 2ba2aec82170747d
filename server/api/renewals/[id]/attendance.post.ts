import { idParams } from '#shared/schemas/common'
import { attendanceBody, renewalRoundView } from '#shared/schemas/renewals'
import { recordAttendance } from '../../../services/renewals'

export default defineRoute({
  summary: 'Record who was at a renewal session',
  ability: 'renewals.manage', params: idParams, body: attendanceBody, answer: renewalRoundView,
}, ({ work, params, body }) => recordAttendance(work, params.id, body))
