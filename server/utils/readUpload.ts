import { Busboy, type BusboyHeaders } from '@fastify/busboy'
import type { H3Event } from 'h3'
import { Refusal } from '../services/refusal'

/** One uploaded file, whole. `name` is what the sender called it: never use it as a path. */
export interface Upload { bytes: Buffer, name: string }

const megabyte = 1024 * 1024
/** Parts around the file: boundaries and headers. */
const slack = 64 * 1024

const tooLarge = (most: number) => new Refusal('tooLarge', 'tooLarge', { message: `At most ${most / megabyte} MB`, data: { mostMegabytes: most / megabyte } })
const badForm = (message: string) => new Refusal('malformed', 'invalid', { message, fields: { file: message } })

/** Opens a reader with hard limits; throws 400 when the header names no boundary. */
function openReader(event: H3Event, most: number): InstanceType<typeof Busboy> {
  try {
    return new Busboy({ headers: event.node.req.headers as BusboyHeaders, limits: { files: 1, fields: 0, parts: 2, fileSize: most + 1, headerPairs: 50 } })
  }
  catch {
    throw badForm('is not a form')
  }
}

/**
 * Reads the one file of a multipart form, field `file`, as it streams in, and stops at `most` bytes (413). A body that
 * is no form is 415; one without the field, with more than it, or broken off is 400. Nothing is written to disk.
 */
export async function readUpload(event: H3Event, most = 10 * megabyte): Promise<Upload> {
  if (!/^multipart\/form-data\b/i.test(getHeader(event, 'content-type') ?? '')) throw new Refusal('wrongType', 'notForm', { message: 'Send multipart/form-data with the field `file`' })
  if (Number(getHeader(event, 'content-length') ?? 0) > most + slack) throw tooLarge(most)
  const reader = openReader(event, most)
  const request = event.node.req
  return new Promise((done, fail) => {
    const chunks: Buffer[] = []
    let size = 0
    let name: string | undefined
    const stop = (problem: Refusal) => {
      request.unpipe(reader)
      request.resume()
      fail(problem)
    }
    reader.on('file', (field, stream, fileName) => {
      if (field !== 'file') return stop(badForm(`unexpected field ${field}`))
      name = fileName ?? ''
      stream.on('data', (chunk: Buffer) => {
        size += chunk.length
        if (size > most) stop(tooLarge(most))
        else chunks.push(chunk)
      })
    })
    reader.on('field', field => stop(badForm(`unexpected field ${field}`)))
    reader.on('filesLimit', () => stop(badForm('send one file')))
    reader.on('fieldsLimit', () => stop(badForm('send the file only')))
    reader.on('error', () => stop(badForm('is not a whole form')))
    reader.on('finish', () => {
      if (name === undefined) return stop(badForm('is missing'))
      if (size === 0) return stop(badForm('is empty'))
      done({ bytes: Buffer.concat(chunks), name })
    })
    request.on('aborted', () => stop(badForm('was broken off')))
    request.pipe(reader)
  })
}
