import { readyState } from '../../services/app-state'
import { sendThroughSmtp } from '../../services/mail-sending'

export default defineTask({
  meta: { name: 'mail:send', description: 'Sends what is due in the mail queue' },
  run: async () => {
    const state = readyState()
    return { result: state ? await sendThroughSmtp(state.db, state.settings) : 0 }
  },
})
