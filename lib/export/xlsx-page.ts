import type { PageSetup, PaperSize, Worksheet } from 'exceljs'
import { shortCaution } from './caution'
import { headerText, pageLine } from './safe-text'
import { statusOf, type TitleBlock } from './title-block'

/** Number of the paper size in the file format (ECMA-376 part 1, 18.3.1.63); the library's own list has no A3. */
export const paper = { a3: 8 as PaperSize, a4: 9 as PaperSize } as const

/** Common practice: 8 to 12 streams on an A3 sheet; a few more still read. */
const streamsPerPage = 14

export const pagesWide = (streams: number): number => Math.max(1, Math.ceil(streams / streamsPerPage))

/** Sheet, fit to width, margins, and head and foot lines with the document's number, its state and the caution. */
export function setUpPage(sheet: Worksheet, title: TitleBlock, setup: Partial<PageSetup>): void {
  Object.assign(sheet.pageSetup, {
    orientation: 'landscape',
    fitToPage: true,
    fitToWidth: 1,
    fitToHeight: 0,
    margins: { left: 0.4, right: 0.4, top: 0.7, bottom: 0.7, header: 0.3, footer: 0.3 },
    ...setup,
  })
  const number = headerText(title.documentNumber || 'no document number', 40)
  const { headerFooter } = sheet
  headerFooter.oddHeader = pageLine(
    headerText(title.title, 60),
    headerText(statusOf(title), 40),
    headerText(`${sheet.name}, ${title.caseName}`, 60),
  )
  headerFooter.oddFooter = pageLine(
    `${number}, ${headerText(title.revision, 30)}`,
    headerText(shortCaution, 110),
    'Page &P of &N',
  )
}
