/** Nuxt Content answers a public query route and a dump of everything; only the framework's own calls may reach them. */
export default defineEventHandler((event) => {
  if (isInternal(event)) return
  let path = event.path
  try {
    path = decodeURIComponent(path)
  }
  catch {
    throw createError({ statusCode: 400, statusMessage: 'Bad Request', data: { code: 'malformed' } })
  }
  if (/__nuxt_content|__nuxt-content/i.test(path)) throw createError({ statusCode: 404, statusMessage: 'Not Found', data: { code: 'notFound' } })
})
