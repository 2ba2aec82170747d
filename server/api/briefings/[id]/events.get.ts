import { idParams } from '#shared/schemas/common'
import { holdStream, listenToBriefing } from '../../../services/briefing-events'
import { requireOwnBriefing } from '../../../services/briefing-access'
import { mayStillWatch } from '../../../services/watching'

const heartbeatMilliseconds = 20_000

export default defineRoute({
  summary: 'What happens at a briefing, as server-sent events: signIn, closed, sealed',
  ability: 'briefing.run', params: idParams,
}, async ({ work, params, event }) => {
  await requireOwnBriefing(work, params.id)
  const stream = createEventStream(event)
  const cookies = getHeader(event, 'cookie') ?? ''
  const pushIfAllowed = async (message: { event: string, data: string }) => {
    if (await mayStillWatch(work, cookies, params.id)) await stream.push(message)
    else await stream.close()
  }
  const stopListening = listenToBriefing(params.id, ({ kind, data }) => void pushIfAllowed({ event: kind, data: JSON.stringify(data) }))
  const heartbeat = setInterval(() => void pushIfAllowed({ event: 'heartbeat', data: '{}' }), heartbeatMilliseconds)
  const forget = holdStream(() => void stream.close())
  stream.onClosed(() => {
    forget()
    clearInterval(heartbeat)
    stopListening()
  })
  void stream.push({ event: 'heartbeat', data: '{}' })
  return stream.send()
})
