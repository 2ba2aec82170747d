/** Behind TLS, browsers are told to come back by https only. Never on plain http: a trial on a local network must go on working. */
export default defineEventHandler((event) => {
  if (event.context.settings.hasTls) setResponseHeader(event, 'strict-transport-security', 'max-age=31536000; includeSubDomains')
})
