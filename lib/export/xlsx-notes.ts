import type { Workbook } from 'exceljs'
import type { NoteSection } from './notes'
import type { TitleBlock } from './title-block'
import { fillRow, nextRow, putNumber, putText } from './xlsx-cells'
import { paper, setUpPage } from './xlsx-page'
import * as style from './xlsx-styles'

export const notesSheetName = 'Notes'

/** Characters that fit on one line of the wide column: programs do not widen the row of a wrapped text by themselves. */
const lineLength = 150
const lineHeight = 12.5

export function addNotesSheet(workbook: Workbook, sections: readonly NoteSection[], title: TitleBlock): void {
  const sheet = workbook.addWorksheet(notesSheetName)
  sheet.getColumn(1).width = 6
  sheet.getColumn(2).width = 120
  sheet.views = [{ showGridLines: false }]
  putText(nextRow(sheet, 22).getCell(1), 'Notes', style.title)
  for (const { title: heading, lines, empty } of sections) {
    const band = nextRow(sheet, 16)
    fillRow(band, 1, 2, style.band)
    putText(band.getCell(1), heading, style.band)
    if (lines.length === 0 && empty !== null) putText(nextRow(sheet).getCell(2), empty, style.wrapped)
    lines.forEach((line, index) => {
      const needed = line.split('\n').reduce((sum, part) => sum + Math.max(1, Math.ceil(part.length / lineLength)), 0)
      const row = nextRow(sheet, Math.min(409, needed * lineHeight + 2))
      putNumber(row.getCell(1), index + 1, '0', {
        ...style.wrapped,
        alignment: { vertical: 'top', horizontal: 'left' },
      })
      putText(row.getCell(2), line, style.wrapped)
    })
  }
  setUpPage(sheet, title, { paperSize: paper.a4 })
}
