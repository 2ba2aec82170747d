import { execFileSync } from 'node:child_process'
import { mkdtempSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { BarcodeFormat, BinaryBitmap, DecodeHintType, GlobalHistogramBinarizer, HybridBinarizer, MultiFormatReader, RGBLuminanceSource } from '@zxing/library'
import jsQR from 'jsqr'
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs'
import sharp from 'sharp'

/** The text of each page. */
export async function pagesOf(bytes: Uint8Array): Promise<string[]> {
  const pdf = await getDocument({ data: new Uint8Array(bytes), verbosity: 0 }).promise
  const numbers = Array.from({ length: pdf.numPages }, (_, index) => index + 1)
  return Promise.all(numbers.map(async number => (await (await pdf.getPage(number)).getTextContent()).items.map(item => 'str' in item ? item.str : '').join(' ')))
}

/** Pictures (PNG) of each page, as a printer would draw them. */
export function rasterise(bytes: Uint8Array, dotsPerInch = 120): Buffer[] {
  const folder = mkdtempSync(join(tmpdir(), 'pdf-'))
  writeFileSync(join(folder, 'in.pdf'), bytes)
  execFileSync('pdftoppm', ['-png', '-r', String(dotsPerInch), join(folder, 'in.pdf'), join(folder, 'page')])
  return readdirSync(folder).filter(name => name.endsWith('.png')).sort().map(name => readFileSync(join(folder, name)))
}

/** What two independent readers find in the QR of a picture, with where jsQR saw its corners. */
export async function decodeQr(picture: Buffer): Promise<{ jsqr: string | null, zxing: string | null, corners: { x: number, y: number }[], dark: (x: number, y: number) => boolean }> {
  const { data, info } = await sharp(picture).flatten({ background: '#fff' }).ensureAlpha().raw().toBuffer({ resolveWithObject: true })
  const { width, height } = info
  const found = jsQR(new Uint8ClampedArray(data), width, height)
  const grey = greyOf(data, width * height)
  const corners = found ? [found.location.topLeftCorner, found.location.topRightCorner, found.location.bottomLeftCorner] : []
  return { jsqr: found?.data ?? null, zxing: await decodeWithZxing(picture), corners, dark: (x, y) => grey[Math.round(y) * width + Math.round(x)]! < 128 }
}

function greyOf(data: Buffer, pixels: number): Uint8ClampedArray {
  const grey = new Uint8ClampedArray(pixels)
  for (let index = 0; index < pixels; index++) grey[index] = (data[index * 4]! + data[index * 4 + 1]! + data[index * 4 + 2]!) / 3
  return grey
}

/** The second reader. A phone looks at many frames; this looks at the page at three sizes, with both of the reader's thresholds. */
async function decodeWithZxing(picture: Buffer): Promise<string | null> {
  const reader = new MultiFormatReader()
  reader.setHints(new Map<DecodeHintType, unknown>([[DecodeHintType.POSSIBLE_FORMATS, [BarcodeFormat.QR_CODE]], [DecodeHintType.TRY_HARDER, true]]))
  const { width: full = 0 } = await sharp(picture).metadata()
  for (const share of [1, 0.6, 0.4]) {
    const { data, info } = await sharp(picture).flatten({ background: '#fff' }).resize({ width: Math.round(full * share) }).ensureAlpha().raw().toBuffer({ resolveWithObject: true })
    const source = new RGBLuminanceSource(greyOf(data, info.width * info.height), info.width, info.height)
    for (const binarizer of [new HybridBinarizer(source), new GlobalHistogramBinarizer(source)]) {
      try {
        return reader.decode(new BinaryBitmap(binarizer)).getText()
      }
      catch {
        continue
      }
    }
  }
  return null
}
