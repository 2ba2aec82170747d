import { readyState } from '~~/server/services/app-state'
import { queueReminders } from '~~/server/services/reminders'

/** Every quarter of an hour; what is due goes out once a day (see the service). */
export default defineTask({
  meta: { name: 'reminders:queue', description: 'Queues the day\'s reminders about credentials that run out' },
  async run() {
    const state = readyState()
    return { result: state ? await queueReminders(state.db, state.settings) : 0 }
  },
})
