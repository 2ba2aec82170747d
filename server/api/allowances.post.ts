import { allowanceBody, allowanceView } from '#shared/schemas/allowances'
import { allowForAShift } from '../services/allowances'

export default defineRoute({
  summary: 'Let a card that is not verified yet count for one shift, by a competent person on site',
  ability: 'allowances.give', body: allowanceBody, answer: allowanceView, status: 201,
}, ({ work, body }) => allowForAShift(work, body))
