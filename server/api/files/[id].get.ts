import { idParams } from '#shared/schemas/common'
import { readFileFor } from '~~/server/services/files'

const endings: Record<string, string> = { 'image/jpeg': 'jpg', 'image/png': 'png', 'application/pdf': 'pdf' }

export default defineRoute({
  summary: 'An uploaded picture or PDF, for who may see it',
  ability: 'own.records',
  params: idParams,
}, async ({ work, params, event }) => {
  const { file, bytes } = await readFileFor(work, params.id)
  setResponseHeader(event, 'content-security-policy', 'sandbox; default-src \'none\'; style-src \'unsafe-inline\'')
  return sendDownload(event, { body: bytes, type: file.type, fileName: `card-${file.id}.${endings[file.type] ?? 'bin'}` }, 'inline')
})
