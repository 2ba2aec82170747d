import { languageQuery, lessonParams, lessonView } from '#shared/schemas/learning'
import { readLesson } from '../../../../../services/modules'

export default defineRoute({
  summary: 'One lesson with its parsed text',
  ability: 'learning.own',
  params: lessonParams,
  query: languageQuery,
  answer: lessonView,
}, async ({ work, params: { slug, lesson }, query, event }) => {
  const language = query.language ?? work.actor.language
  return readLesson(work, await getTeaching(event), { slug, lesson, language, page: await getLessonBody(event, { module: slug, lesson, language }) })
})
