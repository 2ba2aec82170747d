import type { HandReason } from '#shared/domain/states'
import type { BriefingView, SignInAnswer } from '#shared/schemas/briefing'
import type { Mark } from '#shared/schemas/mark'

/** Sends what a lead enters at a briefing. Each line has its own key, so a second try doubles nobody. */
export function useAddByHand(briefing: () => BriefingView) {
  const { toProblem } = useApiError()
  const keys = new Map<string, string>()
  const keyFor = (who: string) => keys.get(who) ?? keys.set(who, newKey()).get(who)!
  const send = (body: Record<string, unknown>) => $fetch<SignInAnswer>(`/api/briefings/${briefing().id}/sign-ins`, { method: 'POST', body })

  /** Adds several people with one reason; answers how many went in, and who did not with why. */
  async function addPeople(personIds: readonly string[], reason: HandReason, witness: string): Promise<{ added: number, failed: string[], why: string }> {
    const failed: string[] = []
    let why = ''
    for (const personId of personIds) {
      const mark: Mark = reason === 'cannotRead' ? { kind: 'witnessed', by: witness } : { kind: 'witnessed', by: briefing().runBy.name }
      try {
        await send({ key: keyFor(personId), method: 'addedByForeman', personId, reason, mark })
      }
      catch (error) {
        failed.push(briefing().missingPeople?.find(person => person.personId === personId)?.name ?? personId)
        why = toProblem(error).text
      }
    }
    return { added: personIds.length - failed.length, failed, why }
  }
  const addVisitor = (visitor: { name: string, company: string, host?: string }) => send({ key: keyFor(`${visitor.name}\n${visitor.company}`), method: 'foremanDevice', visitor, mark: { kind: 'tap' } })
  const signOnThisPhone = (personId: string, mark: Mark) => send({ key: keyFor(`phone:${personId}`), method: 'foremanDevice', personId, mark })
  const undo = (signInId: string) => $fetch<null>(`/api/briefings/${briefing().id}/sign-ins/${signInId}`, { method: 'DELETE' })
  return { addPeople, addVisitor, signOnThisPhone, undo }
}
