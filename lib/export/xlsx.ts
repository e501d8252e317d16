import ExcelJS from 'exceljs'
import { bookUnits } from '@/lib/balance/measure/units-of-measure'
import type { LeftOut } from '@/lib/book/problem-draft'
import type { BookState } from '@/lib/book/state'
import { closureModel } from './closure'
import { defaultUnits, givensOf } from './givens-list'
import { notesOf } from './notes'
import { cellText } from './safe-text'
import { type Solved, streamTable } from './stream-table'
import { statusOf, type TitleBlock } from './title-block'
import { addClosureSheet } from './xlsx-closure'
import { addGivensSheet } from './xlsx-givens'
import { addNotesSheet } from './xlsx-notes'
import { addStreamSheet } from './xlsx-stream-table'

export type WorkbookInput = {
  state: BookState
  caseId: string
  solved: Solved
  leftOut: readonly LeftOut[]
  title: TitleBlock
  /** Number of the book's last change. */
  bookNumber: number
  engineVersion: string
  /** Up to which difference a balance counts as closed, per cent; left out: the usual one. */
  closureLimit?: number
}

/** The stream table as a workbook: the table, its closure by live formulas, the givens with their sources, and notes. */
export async function streamTableWorkbook(input: WorkbookInput): Promise<Uint8Array<ArrayBuffer>> {
  const { state, caseId, solved, leftOut, title } = input
  const { problem, solution } = solved
  const units = bookUnits(problem.basis, problem.flowUnit)
  if (!units) throw new Error(`The flow unit ${problem.flowUnit} does not fit a ${problem.basis} basis`)
  const symbols = { mass: units.mass.symbol, mole: units.mole.symbol, volume: units.volume.symbol }
  const table = streamTable(state, solved)
  const givens = givensOf(state, caseId, leftOut, defaultUnits(symbols, problem.basis))
  const workbook = new ExcelJS.Workbook()
  workbook.creator = 'Tallybrook'
  workbook.lastModifiedBy = 'Tallybrook'
  workbook.title = cellText(title.title)
  workbook.subject = cellText(`${title.documentType}, ${title.caseName}, ${statusOf(title)}`)
  workbook.company = cellText(title.owner)
  workbook.created = new Date(`${title.made}T00:00:00Z`)
  workbook.modified = workbook.created
  // Programs that calculate do so on opening; the stored values serve those that do not.
  workbook.calcProperties.fullCalcOnLoad = true
  const places = addStreamSheet(workbook, table, title)
  addClosureSheet(workbook, table, closureModel(problem, solution), title, places, input.closureLimit)
  addGivensSheet(workbook, givens, title)
  addNotesSheet(workbook, notesOf({ ...input, table, givens }), title)
  return new Uint8Array(await workbook.xlsx.writeBuffer()) as Uint8Array<ArrayBuffer>
}
