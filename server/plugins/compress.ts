import { brotliCompress, constants, gzip } from 'node:zlib'
import { promisify } from 'node:util'
import { getRequestHeader, setResponseHeader } from 'h3'

const toBrotli = promisify(brotliCompress)
const toGzip = promisify(gzip)
/** Below this many characters packing costs more than it saves. */
const leastLength = 1400

/**
 * Packs pages and message files, which the server makes anew for each request; public files are packed at build time.
 * API answers stay as they are. No page carries a secret of the server beside text that a stranger chooses.
 */
export default defineNitroPlugin((app) => {
  app.hooks.hook('beforeResponse', async (event, response) => {
    const isMessages = event.path.startsWith('/_i18n/')
    const body = typeof response.body === 'string' ? response.body : isMessages && response.body !== null && typeof response.body === 'object' ? JSON.stringify(response.body) : ''
    if (event.path.startsWith('/api/') || body.length < leastLength || event.node.res.headersSent || event.node.res.hasHeader('content-encoding')) return
    const accepted = getRequestHeader(event, 'accept-encoding') ?? ''
    const encoding = /\bbr\b/.test(accepted) ? 'br' : /\bgzip\b/.test(accepted) ? 'gzip' : null
    setResponseHeader(event, 'vary', 'accept-encoding')
    if (!encoding) return
    if (isMessages) setResponseHeader(event, 'content-type', 'application/json')
    setResponseHeader(event, 'content-encoding', encoding)
    response.body = encoding === 'br' ? await toBrotli(body, { params: { [constants.BROTLI_PARAM_QUALITY]: 4 } }) : await toGzip(body)
  })
})
