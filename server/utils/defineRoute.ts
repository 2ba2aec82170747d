import type { H3Event } from 'h3'
import type { z } from 'zod'
import { can, type Ability, type Actor } from '#shared/access/abilities'
import { dateInZone } from '#shared/domain/dates'
import { getCompany } from '../data/company'
import { loadReach, type Reach } from '../data/reach'
import { Refusal, type RefusalKind } from '../services/refusal'
import type { Work } from '../services/work'
import { readJson } from './readJson'

const statusOf: Record<RefusalKind, [number, string]> = {
  malformed: [400, 'Bad Request'],
  notSignedIn: [401, 'Unauthorized'],
  forbidden: [403, 'Forbidden'],
  notFound: [404, 'Not Found'],
  conflict: [409, 'Conflict'],
  tooLarge: [413, 'Payload Too Large'],
  wrongType: [415, 'Unsupported Media Type'],
  unprocessable: [422, 'Unprocessable Content'],
  tooMany: [429, 'Too Many Requests'],
}

interface RouteParts<Params, Query, Body> {
  /** One line for the API description. */
  summary: string
  params?: z.ZodType<Params>
  query?: z.ZodType<Query>
  body?: z.ZodType<Body>
  /** What is answered, for the API description. */
  answer?: z.ZodType
  /** 200 unless said: 201 when a thing is made, 204 when there is nothing to say. */
  status?: 200 | 201 | 202 | 204
  /** With `?preview=true` nothing is made: answers 200 whatever `status` says. */
  previews?: boolean
}

interface Given<Who extends Actor | null, Params, Query, Body> {
  work: Work<Who>
  params: Params
  query: Query
  body: Body
  event: H3Event
}

/** Turns a zod error into `field → what is wrong`; the first problem of each field is told. */
export function toFields(error: z.ZodError): Record<string, string> {
  const fields: Record<string, string> = {}
  for (const issue of error.issues) {
    const names = issue.code === 'unrecognized_keys' ? issue.keys.map(key => [...issue.path, key].join('.')) : [issue.path.join('.') || 'body']
    for (const name of names) fields[name] ??= issue.code === 'unrecognized_keys' ? 'unknown field' : issue.message
  }
  return fields
}

/** Checks `value` with `schema`; throws a 400 refusal that names the fields. */
export function parseInput<Output>(schema: z.ZodType<Output> | undefined, value: unknown): Output {
  if (!schema) return undefined as Output
  const parsed = schema.safeParse(value)
  if (parsed.success) return parsed.data
  const fields = toFields(parsed.error)
  throw new Refusal('malformed', 'invalid', { message: Object.entries(fields).map(([field, why]) => `${field}: ${why}`).join('; '), fields })
}

/** The error that the framework answers for a refusal. */
export function toHttpError(refusal: Refusal) {
  const [statusCode, statusMessage] = statusOf[refusal.kind]
  const { fields, data, message } = refusal.details
  return createError({ statusCode, statusMessage, message: message ?? refusal.code, data: { code: refusal.code, ...(fields && { fields }), ...data } })
}

async function workOf<Who extends Actor | null>(event: H3Event, actor: Who): Promise<Work<Who>> {
  const { db, settings } = event.context
  const company = await getCompany(db)
  const now = settings.clock.now()
  const today = dateInZone(now, company.timeZone)
  let reach: Promise<Reach> | undefined
  return {
    db, actor, now, today, company, settings,
    reach: () => reach ??= actor ? loadReach(db, actor, today) : Promise.resolve({ siteIds: new Set<string>(), crewIds: new Set<string>() }),
  }
}

type Handle<Who extends Actor | null, Params, Query, Body, Answer> = (given: Given<Who, Params, Query, Body>) => Answer | Promise<Answer>

const isPreview = (query: unknown) => typeof query === 'object' && query !== null && 'preview' in query && query.preview === true

async function run<Who extends Actor | null, Params, Query, Body, Answer>(event: H3Event, actor: Who, parts: RouteParts<Params, Query, Body>, handle: Handle<Who, Params, Query, Body, Answer>): Promise<Answer> {
  try {
    const params = parseInput(parts.params, getRouterParams(event, { decode: true }))
    const query = parseInput(parts.query, getQuery(event))
    const body = parts.body ? parseInput(parts.body, await readJson(event)) : undefined as Body
    const answer = await handle({ work: await workOf(event, actor), params, query, body, event })
    const status = event.context.answerStatus ?? (parts.previews && isPreview(query) ? 200 : parts.status)
    if (status) setResponseStatus(event, status)
    return status === 204 ? null as Answer : answer
  }
  catch (error) {
    if (!(error instanceof Refusal)) throw error
    if (error.details.retryAfter !== undefined) setResponseHeader(event, 'retry-after', Math.max(1, Math.ceil(error.details.retryAfter)))
    throw toHttpError(error)
  }
}

/**
 * An API route for somebody signed in: who (session), may they at all (ability), what (schemas), then `handle`
 * does it in one call and answers a named view. Whose records it reaches is the service's to check (404).
 */
export function defineRoute<Params = undefined, Query = undefined, Body = undefined, Answer = unknown>(parts: RouteParts<Params, Query, Body> & { ability: Ability }, handle: Handle<Actor, Params, Query, Body, Answer>) {
  const handler = defineEventHandler((event): Promise<Answer> => {
    const { actor } = event.context
    if (!actor) throw toHttpError(new Refusal('notSignedIn', 'notSignedIn', { message: 'Sign in first' }))
    if (!can(actor, parts.ability)) throw toHttpError(new Refusal('forbidden', 'forbidden', { message: 'Your role may not do this' }))
    return run(event, actor, parts, handle)
  })
  return Object.assign(handler, { parts })
}

/** An API route that answers without a session; it must stand on the public list (`server/services/public-routes.ts`). */
export function definePublicRoute<Params = undefined, Query = undefined, Body = undefined, Answer = unknown>(parts: RouteParts<Params, Query, Body>, handle: Handle<Actor | null, Params, Query, Body, Answer>) {
  const handler = defineEventHandler((event): Promise<Answer> => run(event, event.context.actor, parts, handle))
  return Object.assign(handler, { parts: { ...parts, ability: 'public' as const } })
}
