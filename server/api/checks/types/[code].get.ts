import { z } from 'zod'
import { code } from '#shared/schemas/common'
import { readTypeName } from '~~/server/services/card-check'

export default definePublicRoute({
  summary: 'The names of a credential type',
  params: z.strictObject({ code }),
  answer: z.object({ en: z.string(), es: z.string() }),
}, ({ work, params }) => readTypeName(work, params.code))
