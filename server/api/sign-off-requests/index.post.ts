import { signOffRequestBody, signOffRequestMade } from '#shared/schemas/learning'
import { askForSignOff } from '../../services/sign-offs'

export default defineRoute({
  summary: 'Ask for the hands-on of a module',
  ability: 'learning.own',
  body: signOffRequestBody,
  answer: signOffRequestMade,
  status: 201,
}, async ({ work, body, event }) => askForSignOff(work, await getTeaching(event), body.module))
