import type { Workbook } from 'exceljs'
import type { GivenLine } from './givens-list'
import type { TitleBlock } from './title-block'
import { nextRow, putNumber, putText } from './xlsx-cells'
import { paper, setUpPage } from './xlsx-page'
import * as style from './xlsx-styles'

export const givensSheetName = 'Givens'

const columns: [head: string, width: number, read: (line: GivenLine) => string | number | null][] = [
  ['Stream', 9, ({ stream }) => stream],
  ['Measure', 20, ({ measure }) => measure],
  ['Component', 12, ({ component }) => component],
  ['Instrument', 12, ({ instrument }) => instrument],
  ['As typed', 16, ({ text }) => text],
  ['Value', 13, ({ value }) => value],
  ['Unit', 9, ({ unit }) => unit],
  ['Half-width', 11, ({ halfWidth }) => halfWidth],
  ['Sigma', 11, ({ sigma }) => sigma],
  ['Use', 11, ({ use }) => use],
  ['Kind of source', 14, ({ sourceKind }) => sourceKind],
  ['Source', 34, ({ source }) => source],
  ['Note', 34, ({ note }) => note],
  ['Not used because', 34, ({ remark }) => remark],
]

/** Every given with its place, what was typed, and where it comes from. */
export function addGivensSheet(workbook: Workbook, givens: readonly GivenLine[], title: TitleBlock): void {
  const sheet = workbook.addWorksheet(givensSheetName)
  sheet.getColumn(1).width = 6
  columns.forEach(([, width], index) => {
    sheet.getColumn(index + 2).width = width
  })
  putText(nextRow(sheet, 22).getCell(1), 'Givens and their sources', style.title)
  const heads = nextRow(sheet, 16)
  putText(heads.getCell(1), 'No.', style.headLeft)
  columns.forEach(([head], index) => {
    putText(heads.getCell(index + 2), head, style.headLeft)
  })
  sheet.views = [{ state: 'frozen', xSplit: 4, ySplit: heads.number, showGridLines: false }]
  givens.forEach((given, index) => {
    const row = nextRow(sheet)
    putNumber(row.getCell(1), index + 1, '0', style.listFigure)
    columns.forEach(([, , read], at) => {
      const value = read(given)
      if (typeof value === 'number') putNumber(row.getCell(at + 2), value, 'General', style.listFigure)
      else putText(row.getCell(at + 2), value ?? '', style.listText)
    })
  })
  if (givens.length > 0)
    sheet.autoFilter = {
      from: { row: heads.number, column: 1 },
      to: { row: heads.number + givens.length, column: columns.length + 1 },
    }
  setUpPage(sheet, title, { paperSize: paper.a4, printTitlesRow: `${heads.number}:${heads.number}` })
}
