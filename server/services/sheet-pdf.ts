import type { BriefingSheet, SheetAddendum } from '#shared/domain/sheet'
import type { Language } from '#shared/domain/states'
import type { SheetRow } from '../data/sheets'
import { renderSheet } from '../documents/sheet'
import { requireSheets } from './sheets'
import type { Work } from './work'

/** A briefing's sealed sheet with its addenda as a PDF. 404 before the seal. */
export async function readSheetPdf(work: Work, briefingId: string, language: Language, origin: string): Promise<{ bytes: Buffer, name: string }> {
  const { sheet, addenda } = await requireSheets(work, briefingId)
  const toSealed = <Body>(row: SheetRow) => ({ body: JSON.parse(row.body) as Body, hash: row.hash, previousHash: row.previousHash, checkUrl: `${origin}/check/${row.hash}` })
  const made = toSealed<BriefingSheet>(sheet)
  const bytes = await renderSheet({ sheet: made, addenda: addenda.map(row => toSealed<SheetAddendum>(row)), language })
  return { bytes, name: `${made.body.date}-${made.body.siteCode.replace(/[^\w-]/g, '-')}-${sheet.number}.pdf` }
}
