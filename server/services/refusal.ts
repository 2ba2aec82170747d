/** How a refusal is answered; each maps to one HTTP status in `server/utils/defineRoute.ts`. */
export type RefusalKind = 'malformed' | 'notSignedIn' | 'forbidden' | 'notFound' | 'conflict' | 'tooLarge' | 'wrongType' | 'unprocessable' | 'tooMany'

interface RefusalDetails {
  /** Plain words for a person; screens prefer the translated text of `code`. */
  message?: string
  /** Field → what is wrong with it. */
  fields?: Record<string, string>
  /** Seconds to wait, for `tooMany`. */
  retryAfter?: number
  /** Anything else that the answer's `data` should hold. */
  data?: Record<string, unknown>
}

/** Thrown by services when something may not be done; `code` is a stable word that clients can rely on. */
export class Refusal extends Error {
  readonly kind: RefusalKind
  readonly code: string
  readonly details: RefusalDetails

  constructor(kind: RefusalKind, code: string, details: RefusalDetails = {}) {
    super(details.message ?? code)
    this.name = 'Refusal'
    this.kind = kind
    this.code = code
    this.details = details
  }
}

/** "Not there, or not yours to know." */
export const notFound = (what: string) => new Refusal('notFound', 'notFound', { message: `No such ${what}` })

/** Bad input in one field that the schema alone cannot see. */
export const badField = (field: string, why: string, code = 'invalid') => new Refusal('unprocessable', code, { message: why, fields: { [field]: why } })
