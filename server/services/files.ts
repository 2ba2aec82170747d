import { randomUUID } from 'node:crypto'
import { mkdir, open, readFile, rename, stat } from 'node:fs/promises'
import { dirname, join } from 'node:path'
import { fileTypeFromBuffer } from 'file-type'
import sharp from 'sharp'
import { can } from '#shared/access/abilities'
import { findFile, insertFile, listHoldersOfFile, type StoredFile } from '../data/files'
import { mayReadHolder } from './credentials'
import { sha256 } from './hashing'
import { notFound, Refusal } from './refusal'
import type { Settings } from './settings'
import type { Work } from './work'

/** Longest side of a kept picture, in pixels: a card stays readable, a phone's 12 megapixels do not fill the disk. */
const longestSide = 2600
const mostPixels = 60_000_000
const heic = new Set(['image/heic', 'image/heif', 'image/heic-sequence', 'image/heif-sequence', 'image/avif'])
const pictures = new Set(['image/jpeg', 'image/png', 'image/webp'])

const wrongFile = (code: string, message: string) => new Refusal('wrongType', code, { message, fields: { file: message } })

/** Drawn anew without anything but its pixels: no place, no camera, nothing hidden behind the picture. */
async function redraw(bytes: Buffer, type: string): Promise<{ bytes: Buffer, type: string }> {
  try {
    const picture = sharp(bytes, { limitInputPixels: mostPixels, failOn: 'error' }).rotate().resize({ width: longestSide, height: longestSide, fit: 'inside', withoutEnlargement: true })
    return type === 'image/png'
      ? { bytes: await picture.png({ compressionLevel: 9 }).toBuffer(), type }
      : { bytes: await picture.flatten({ background: '#ffffff' }).jpeg({ quality: 85, mozjpeg: true }).toBuffer(), type: 'image/jpeg' }
  }
  catch {
    throw wrongFile('brokenPicture', 'The picture can\'t be read')
  }
}

/** A PDF is kept as it is when it begins and ends like one and carries nothing that runs. */
function requireQuietPdf(bytes: Buffer): void {
  const isWhole = bytes.subarray(0, 5).toString('latin1') === '%PDF-' && bytes.subarray(-2048).includes('%%EOF')
  if (!isWhole) throw wrongFile('brokenPdf', 'The PDF is not whole')
  if (/\/(JavaScript|JS|Launch|EmbeddedFile|RichMedia)\b/.test(bytes.toString('latin1'))) throw wrongFile('activePdf', 'The PDF holds scripts or other files; print it to a new PDF')
}

async function toKept(bytes: Buffer): Promise<{ bytes: Buffer, type: string }> {
  const type = (await fileTypeFromBuffer(bytes))?.mime ?? ''
  if (heic.has(type)) throw wrongFile('heic', 'HEIC pictures can\'t be read: take the photo as JPEG')
  if (pictures.has(type)) return redraw(bytes, type)
  if (type !== 'application/pdf') throw wrongFile('wrongFileType', 'Only JPEG, PNG, WebP and PDF')
  requireQuietPdf(bytes)
  return { bytes, type }
}

const pathOf = (settings: Settings, hash: string) => join(settings.filesPath, hash.slice(0, 2), hash)

/** Writes bytes under their own hash, whole or not at all; the same bytes are kept once. */
async function keep(settings: Settings, hash: string, bytes: Buffer): Promise<void> {
  const path = pathOf(settings, hash)
  if (await stat(path).then(() => true, () => false)) return
  await mkdir(dirname(path), { recursive: true })
  const partial = `${path}.${randomUUID()}`
  const handle = await open(partial, 'wx', 0o640)
  try {
    await handle.writeFile(bytes)
    await handle.sync()
  }
  finally {
    await handle.close()
  }
  await rename(partial, path)
}

/** Keeps an upload, judged by its content and not by its name, and answers what it became. */
export async function keepUpload(work: Work, bytes: Buffer): Promise<Pick<StoredFile, 'id' | 'type' | 'size'>> {
  const kept = await toKept(bytes)
  const hash = sha256(kept.bytes)
  await keep(work.settings, hash, kept.bytes)
  const file = { id: randomUUID(), sha256: hash, type: kept.type, size: kept.bytes.length, ownerId: work.actor.personId, createdAt: work.now }
  await insertFile(work.db, file)
  return { id: file.id, type: file.type, size: file.size }
}

/** The bytes of an upload for its owner, the safety manager, and whoever may see a credential that shows it; otherwise 404. */
export async function readFileFor(work: Work, id: string): Promise<{ file: StoredFile, bytes: Buffer }> {
  const file = await findFile(work.db, id)
  if (!file || !await mayRead(work, file)) throw notFound('file')
  return { file, bytes: await readFile(pathOf(work.settings, file.sha256)) }
}

async function mayRead(work: Work, file: StoredFile): Promise<boolean> {
  if (file.ownerId === work.actor.personId || can(work.actor, 'credentials.readAll')) return true
  for (const holder of await listHoldersOfFile(work.db, file.id)) {
    if (await mayReadHolder(work, holder)) return true
  }
  return false
}
