import { publicKeysView } from '#shared/schemas/credentials'
import { listPublicKeys } from '~~/server/services/signing-key'

export default definePublicRoute({
  summary: 'The public keys that this company signs cards and sheets with',
  answer: publicKeysView,
}, ({ work }) => ({ company: work.company.name, keys: listPublicKeys(work.settings) }))
