import { inflateRawSync } from 'node:zlib'
import { Refusal } from '../refusal'

const mostEntries = 500
const mostBytes = 100 * 1024 * 1024

const refuse = (code: string, message: string) => new Refusal('unprocessable', code, { message, fields: { file: message } })

/** Where the central directory of a zip begins, and how many entries it has; zip64 is refused. */
function directoryOf(bytes: Buffer): { start: number, entries: number } {
  const end = bytes.lastIndexOf(Buffer.from([0x50, 0x4B, 0x05, 0x06]))
  if (end < 0 || end + 22 > bytes.length) throw refuse('brokenSheet', 'is not a whole workbook')
  const entries = bytes.readUInt16LE(end + 10)
  const start = bytes.readUInt32LE(end + 16)
  if (entries > mostEntries || start > bytes.length) throw refuse('zipBomb', 'the workbook has too many parts')
  return { start, entries }
}

/**
 * Unpacks a workbook once with a hard limit, before anything else does: a small file that unfolds to gigabytes, or
 * one whose directory lies, or one with macros, is refused (422) and never reaches the reader.
 */
export function guardZip(bytes: Buffer): void {
  const { start, entries } = directoryOf(bytes)
  let left = mostBytes
  let at = start
  for (let entry = 0; entry < entries; entry++) {
    if (at + 46 > bytes.length || bytes.readUInt32LE(at) !== 0x02014B50) throw refuse('brokenSheet', 'is not a whole workbook')
    const [method, packed, local] = [bytes.readUInt16LE(at + 10), bytes.readUInt32LE(at + 20), bytes.readUInt32LE(at + 42)]
    if (/vbaProject\.bin$/i.test(bytes.toString('latin1', at + 46, at + 46 + bytes.readUInt16LE(at + 28)))) throw refuse('macroWorkbook', 'the workbook carries macros')
    at += 46 + bytes.readUInt16LE(at + 28) + bytes.readUInt16LE(at + 30) + bytes.readUInt16LE(at + 32)
    if (local + 30 > bytes.length) throw refuse('brokenSheet', 'is not a whole workbook')
    const from = local + 30 + bytes.readUInt16LE(local + 26) + bytes.readUInt16LE(local + 28)
    left -= sizeOf(bytes.subarray(from, from + packed), method, left)
  }
}

function sizeOf(packed: Buffer, method: number, left: number): number {
  if (method === 0 && packed.length <= left) return packed.length
  try {
    return inflateRawSync(packed, { maxOutputLength: Math.max(1, left) }).length
  }
  catch {
    throw refuse('zipBomb', 'the workbook unfolds to too much, or is broken')
  }
}
