import { z } from 'zod'
import { isCalendarDate, isInstant, isKnownTimeZone } from '../domain/dates'

/** One line of text, trimmed, not empty. */
export const line = (most = 200) => z.string().trim().min(1, 'is empty').max(most, `at most ${most} characters`).refine(text => !/[\r\n\p{Cc}]/u.test(text), 'must be one line')
/** Free text that may hold line breaks, trimmed, not empty. */
export const text = (most = 4000) => z.string().trim().min(1, 'is empty').max(most, `at most ${most} characters`).refine(value => !/[^\P{Cc}\r\n\t]/u.test(value), 'holds control characters')
/** A calendar date, `YYYY-MM-DD`. */
export const date = z.string().refine(isCalendarDate, 'must be a date like 2026-12-01')
/** An instant, ISO 8601 UTC with Z. */
export const instant = z.string().refine(isInstant, 'must be an instant like 2026-12-01T14:00:00Z')
export const timeZone = z.string().refine(isKnownTimeZone, 'must be a time zone like America/Denver')
export const language = z.enum(['en', 'es'])
export const id = z.string().min(1).max(64)
/** A stable word for duties, types, modules, talks: lower-case letters, digits and dashes. */
export const code = z.string().regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, 'lower-case letters, digits and dashes').max(60)
/** An e-mail address, lower-cased. */
export const email = z.string().trim().toLowerCase().max(254).pipe(z.email('must be an e-mail address'))
/** `true` or `false` in a query string. */
export const flag = z.enum(['true', 'false']).transform(value => value === 'true')

export const idParams = z.strictObject({ id })
/** `?page=1&perPage=50`, at most 200 a page; spread into a list's query. */
export const paging = {
  page: z.coerce.number().int().min(1).max(1_000_000).default(1),
  perPage: z.coerce.number().int().min(1).max(200).default(50),
}
/** The shape of every list. */
export const listOf = <Item extends z.ZodType>(item: Item) => z.object({ items: z.array(item), total: z.number().int(), page: z.number().int(), perPage: z.number().int() })
export interface Page<Item> { items: Item[], total: number, page: number, perPage: number }

/** What a list is exported as. */
export const exportFormats = ['csv', 'xlsx', 'pdf', 'ics'] as const
export type ExportFormat = (typeof exportFormats)[number]
/** What a list without days is exported as: a calendar of it would be empty. */
export const tableFormats = ['csv', 'xlsx', 'pdf'] as const
/** A list's own filters without its pages, and the format. */
export const exportOf = <Shape extends z.ZodRawShape, Format extends ExportFormat>(query: z.ZodObject<Shape>, formats: readonly Format[]) =>
  z.strictObject({ ...Object.fromEntries(Object.entries(query.shape).filter(([name]) => name !== 'page' && name !== 'perPage')) as Omit<Shape, 'page' | 'perPage'>, format: z.enum(formats) })
