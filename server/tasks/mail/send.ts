import { readyState } from '../../services/app-state'
import { sendQueued } from '../../services/mail-sending'

export default defineTask({
  meta: { name: 'mail:send', description: 'Sends what is due in the mail queue' },
  run: async () => {
    const state = readyState()
    return { result: state ? await sendQueued(state.db, state.settings) : 0 }
  },
})
