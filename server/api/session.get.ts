import { sessionView } from '#shared/schemas/session'
import { Refusal } from '../services/refusal'

export default definePublicRoute({ summary: 'Who is signed in', answer: sessionView }, ({ work: { actor } }) => {
  if (!actor) throw new Refusal('notSignedIn', 'notSignedIn', { message: 'Sign in first' })
  const { personId, name, role, language } = actor
  return { person: { id: personId, name, role, language } }
})
