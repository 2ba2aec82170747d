import type { H3Event } from 'h3'
import { Refusal } from '../services/refusal'

const mostBytes = 1_000_000

/**
 * The request's JSON body, or undefined when it has none. Refuses what is not JSON (415, 400), what is larger than
 * 1 MB (413), and text that can't be kept exactly: NUL and lone surrogates (400).
 */
export async function readJson(event: H3Event): Promise<unknown> {
  if (Number(getHeader(event, 'content-length') ?? 0) > mostBytes) throw new Refusal('tooLarge', 'tooLarge', { message: 'At most 1 MB' })
  const raw = await readRawBody(event, 'utf8')
  if (!raw) return undefined
  if (raw.length > mostBytes) throw new Refusal('tooLarge', 'tooLarge', { message: 'At most 1 MB' })
  if (!/^application\/([\w.+-]+\+)?json\b/i.test(getHeader(event, 'content-type') ?? '')) throw new Refusal('wrongType', 'notJson', { message: 'Send application/json' })
  try {
    return JSON.parse(raw, (_key, value: unknown) => {
      if (typeof value === 'string' && (value.includes('\0') || !value.isWellFormed())) throw new Refusal('malformed', 'badText', { message: 'Text holds a character that can\'t be kept' })
      return value
    })
  }
  catch (error) {
    if (error instanceof Refusal) throw error
    throw new Refusal('malformed', 'notJson', { message: 'The body is not JSON' })
  }
}
