import { defineCollection, defineContentConfig, z } from '@nuxt/content'

const step = z.object({ id: z.string(), text: z.string() })
const module = z.object({
  title: z.string(),
  summary: z.string(),
  cautions: z.array(z.string()).min(1),
  checklist: z.array(step).default([]),
  sources: z.array(z.string()).min(1),
})
const lesson = z.object({
  title: z.string(),
  minutes: z.number().int().min(1).max(15),
  order: z.number().int().min(1),
  sources: z.array(z.string()).min(1),
})
const talk = z.object({
  title: z.string(),
  minutes: z.number().int().min(3).max(15),
  work: z.array(z.string()),
  hazards: z.array(z.string()),
  seasons: z.array(z.string()),
  sources: z.array(z.string()).min(1),
})

/** Two collections of each kind, one per language, under the same paths; the server picks by language. */
const both = <Name extends string, Schema extends Parameters<typeof defineCollection>[0]['schema']>(name: Name, source: (language: string) => { include: string, exclude?: string[], prefix: string }, schema: Schema) => ({
  [`${name}En`]: defineCollection({ type: 'page', source: source('en'), schema }),
  [`${name}Es`]: defineCollection({ type: 'page', source: source('es'), schema }),
})

export default defineContentConfig({
  collections: {
    ...both('modules', language => ({ include: `${language}/modules/*/index.md`, prefix: '/modules' }), module),
    ...both('lessons', language => ({ include: `${language}/modules/*/*.md`, exclude: ['**/index.md'], prefix: '/lessons' }), lesson),
    ...both('talks', language => ({ include: `${language}/talks/*.md`, prefix: '/talks' }), talk),
  },
})
