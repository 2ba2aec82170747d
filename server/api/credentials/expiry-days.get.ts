import { credentialFilterQuery, expiryDays } from '#shared/schemas/credentials'
import { readExpiryDays } from '~~/server/services/credentials'

export default defineRoute({
  summary: 'How many of the filtered credentials expire on each day',
  ability: 'credentials.read',
  query: credentialFilterQuery,
  answer: expiryDays,
}, ({ work, query }) => readExpiryDays(work, query))
