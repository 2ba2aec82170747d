import { z } from 'zod'
import { version } from '../../package.json'

interface ListedRoute { method: string, path: string, load: () => Promise<unknown> }
interface DescribedParts { summary: string, ability: string, params?: z.ZodType, query?: z.ZodType, body?: z.ZodType, answer?: z.ZodType, status?: number }

/** Keeps JSON Schema plain: what a schema transforms into is described by what it takes in. */
const toSchema = (schema: z.ZodType, io: 'input' | 'output') => {
  const { $schema: _dialect, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: 'any' })
  return rest
}

function toParameters(schema: z.ZodType | undefined, place: 'path' | 'query') {
  if (!schema) return []
  const described = toSchema(schema, 'input') as { properties?: Record<string, unknown>, required?: string[] }
  return Object.entries(described.properties ?? {}).map(([name, shape]) => ({ name, in: place, required: place === 'path' || (described.required ?? []).includes(name), schema: shape }))
}

function hasParts(handler: unknown): handler is { parts: DescribedParts } {
  return typeof handler === 'function' && 'parts' in handler
}

/** An OpenAPI 3.1 document made from the same schemas that check the requests. */
export async function describeRoutes(routes: ListedRoute[]) {
  const paths: Record<string, Record<string, unknown>> = {}
  for (const route of routes) {
    const handler = await route.load()
    if (!hasParts(handler)) continue
    const { parts } = handler
    const names = [...route.path.matchAll(/\{(\w+)\}/g)].map(match => match[1]!)
    const described = toParameters(parts.params, 'path')
    const parameters = [...names.map(name => described.find(row => row.name === name) ?? { name, in: 'path', required: true, schema: { type: 'string' } }), ...toParameters(parts.query, 'query')]
    paths[route.path] = {
      ...paths[route.path],
      [route.method.toLowerCase()]: {
        summary: parts.summary,
        description: parts.ability === 'public' ? 'Needs no session.' : `Needs the ability \`${parts.ability}\`.`,
        security: parts.ability === 'public' ? [] : [{ session: [] }],
        parameters,
        ...(parts.body && { requestBody: { required: true, content: { 'application/json': { schema: toSchema(parts.body, 'input') } } } }),
        responses: {
          [parts.status ?? 200]: { description: 'Done', ...(parts.answer && { content: { 'application/json': { schema: toSchema(parts.answer, 'output') } } }) },
          default: { description: 'Refused', content: { 'application/json': { schema: { $ref: '#/components/schemas/Problem' } } } },
        },
      },
    }
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Pourwright', version, description: 'Training, certification tracking and safety briefings for crews that build ICF walls. Changes need a matching Origin header.' },
    paths,
    components: {
      securitySchemes: { session: { type: 'apiKey', in: 'cookie', name: 'session' } },
      schemas: {
        Problem: {
          type: 'object',
          properties: { statusCode: { type: 'integer' }, statusMessage: { type: 'string' }, message: { type: 'string' }, data: { type: 'object', properties: { code: { type: 'string' }, fields: { type: 'object', additionalProperties: { type: 'string' } } } } },
        },
      },
    },
  }
}
