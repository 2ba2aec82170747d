import { signOffBody, signOffMade } from '#shared/schemas/learning'
import { signOff } from '../../services/sign-offs'

export default defineRoute({
  summary: 'Sign off somebody\'s hands-on, step by step',
  ability: 'signOff.give',
  body: signOffBody,
  answer: signOffMade,
  status: 201,
}, async ({ work, body, event }) => signOff(work, await getTeaching(event), body))
