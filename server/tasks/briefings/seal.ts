import { readyState } from '../../services/app-state'
import { sealLeftOvers } from '../../services/sealing'

export default defineTask({
  meta: { name: 'briefings:seal', description: 'Seals briefings that were left open when their site\'s day ended' },
  run: async () => {
    const state = readyState()
    return { result: state ? await sealLeftOvers(state.db, state.settings) : 0 }
  },
})
