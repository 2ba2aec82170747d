import { credentialList, credentialListQuery } from '#shared/schemas/credentials'
import { readCredentials } from '~~/server/services/credentials'

export default defineRoute({
  summary: 'Credentials with their state today: one\'s own, one\'s crews\', or everybody\'s',
  ability: 'credentials.read',
  query: credentialListQuery,
  answer: credentialList,
}, ({ work, query }) => readCredentials(work, query))
