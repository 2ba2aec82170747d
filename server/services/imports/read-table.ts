import Papa from 'papaparse'
import { readSheet } from 'read-excel-file/node'
import { Refusal } from '../refusal'
import { guardZip } from './zip-guard'

/** A row as it was sent: numbered as in the file, from 1; cells are trimmed text. */
export interface FileRow { number: number, cells: string[] }

export const mostRows = 20_000

const refuse = (code: string, message: string) => new Refusal('unprocessable', code, { message, fields: { file: message } })

/** UTF-8 when it is whole UTF-8, otherwise windows-1252, which older spreadsheets write; without the byte order mark. */
export function decodeText(bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  }
  catch {
    return new TextDecoder('windows-1252').decode(bytes)
  }
}

function csvCells(bytes: Buffer): string[][] {
  if (bytes.includes(0)) throw new Refusal('wrongType', 'wrongFileType', { message: 'Only CSV and XLSX', fields: { file: 'Only CSV and XLSX' } })
  const { data, errors } = Papa.parse<string[]>(decodeText(bytes), { delimitersToGuess: [',', ';', '\t', '|'], preview: mostRows + 2 })
  const problem = errors.find(error => error.type === 'Quotes')
  if (problem) throw refuse('brokenCsv', `row ${(problem.row ?? 0) + 1}: a quote is not closed`)
  return data
}

const toText = (cell: unknown): string => {
  if (cell === null || cell === undefined) return ''
  return cell instanceof Date ? cell.toISOString().slice(0, 10) : String(cell)
}

async function sheetCells(bytes: Buffer): Promise<string[][]> {
  guardZip(bytes)
  try {
    const rows = await readSheet(bytes)
    return rows.map(row => row.map(toText))
  }
  catch {
    throw refuse('brokenSheet', 'the workbook can\'t be read')
  }
}

/** Reads a CSV or an XLSX (judged by its first bytes), header and all. Empty rows are left out; throws 422 on a broken, empty or too long one. */
export async function readRows(bytes: Buffer): Promise<FileRow[]> {
  const isZip = bytes.subarray(0, 4).equals(Buffer.from([0x50, 0x4B, 0x03, 0x04]))
  const all = (isZip ? await sheetCells(bytes) : csvCells(bytes))
    .map((cells, index) => ({ number: index + 1, cells: cells.map(cell => cell.trim()) }))
    .filter(row => row.cells.some(cell => cell !== ''))
  if (all.length < 2) throw refuse('emptyFile', 'has no rows under its header')
  if (all.length > mostRows + 1) throw refuse('tooManyRows', `at most ${mostRows} rows`)
  return all
}
