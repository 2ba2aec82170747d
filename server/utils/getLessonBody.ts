import { queryCollection } from '@nuxt/content/server'
import type { H3Event } from 'h3'
import type { Language } from '#shared/domain/states'

/** The parsed text of a lesson for `<ContentRenderer>` and its sources; undefined when there is none. */
export async function getLessonBody(event: H3Event, { module, lesson, language }: { module: string, lesson: string, language: Language }) {
  const page = await queryCollection(event, language === 'es' ? 'lessonsEs' : 'lessonsEn').path(`/lessons/${module}/${lesson}`).first()
  return page ? { body: page.body, sources: page.sources } : undefined
}
