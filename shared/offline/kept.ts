/**
 * What the service worker keeps on the device, by path. Pages and answers here are personal: they are deleted when
 * somebody signs out or another person signs in.
 */

/** Names of the caches in the browser. `kept` holds what somebody asked to keep; it is never pushed out by other pages. */
export const cacheNames = { pages: 'pages', answers: 'answers', kept: 'kept', assets: 'assets', messages: 'messages' } as const

/** Caches that hold something of a person. */
export const personalCaches: readonly string[] = [cacheNames.pages, cacheNames.answers, cacheNames.kept]

const keptPages = [/^\/$/, /^\/(learn|briefings|talks)(\/|$)/, /^\/(my-cards|crew|crew\/wall|more|questions|kept|near-misses)$/, /^\/recheck$/]
const keptAnswers = [
  /^\/api\/(modules|talks)(\/|$)/, /^\/api\/(session|session\/sites|server-notes|my-day|company|credentials|training-minutes\/own|checks\/keys)$/,
  /^\/api\/sites\/[^/]+\/today$/,
]
/** A quiz is never kept: it is drawn, timed and graded on the server. */
const neverKept = [/^\/learn\/[^/]+\/quiz$/, /\/attempts/]

const matches = (path: string, patterns: readonly RegExp[]) => patterns.some(pattern => pattern.test(path))

/** True for a page that opens without signal once it was seen. */
export const isKeptPage = (path: string) => matches(path, keptPages) && !matches(path, neverKept)

/** True for an answer of the API that may be shown again without signal. */
export const isKeptAnswer = (path: string) => matches(path, keptAnswers) && !matches(path, neverKept)
