import type { H3Event } from 'h3'
import type { Download } from '../services/table-export'

/** Answers with a file to keep; its name is ours, in plain letters. */
export function sendDownload(event: H3Event, { body, type, fileName }: Download, place: 'attachment' | 'inline' = 'attachment') {
  setResponseHeaders(event, { 'content-type': type, 'content-disposition': `${place}; filename="${fileName}"`, 'x-content-type-options': 'nosniff' })
  return body
}
