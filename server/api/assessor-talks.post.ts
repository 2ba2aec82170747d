import { assessorTalkBody, assessorTalkMade } from '#shared/schemas/training'
import { recordAssessorTalk } from '../services/assessor-talks'

export default defineRoute({
  summary: 'Record five minutes with an assessor: opens a paused quiz at once',
  ability: 'signOff.give',
  body: assessorTalkBody,
  answer: assessorTalkMade,
  status: 201,
}, async ({ work, body, event }) => recordAssessorTalk(work, await getTeaching(event), body))
