import type { Borders, Fill, Style } from 'exceljs'
import type { ExportState } from './table-model'

const colour = (hex: string): { argb: string } => ({ argb: `FF${hex}` })
const solid = (hex: string): Fill => ({ type: 'pattern', pattern: 'solid', fgColor: colour(hex) })

export const ink = colour('1F2723')
export const inkSoft = colour('4C5751')
const hairline = { style: 'hair', color: colour('8F866F') } as const
const rule = { style: 'thin', color: colour('4C5751') } as const
/** Hairlines above and below only: a side line would hide the state's mark of the next cell. */
const lines: Partial<Borders> = { top: hairline, bottom: hairline }

export const fontName = 'Arial'
const font = { name: fontName, size: 9, color: ink }

export const plain: Partial<Style> = { font, alignment: { vertical: 'middle' } }
export const indented: Partial<Style> = { font, alignment: { vertical: 'middle', horizontal: 'left', indent: 1 } }
export const wrapped: Partial<Style> = { font, alignment: { vertical: 'top', wrapText: true } }
export const title: Partial<Style> = { font: { ...font, size: 14, bold: true }, alignment: { vertical: 'middle' } }
export const status: Partial<Style> = {
  font: { ...font, size: 11, bold: true },
  alignment: { vertical: 'middle' },
  border: { left: { style: 'thick', color: ink } },
}
export const fieldLabel: Partial<Style> = {
  font: { ...font, size: 8, color: inkSoft },
  alignment: { vertical: 'middle' },
}
export const fieldValue: Partial<Style> = { font: { ...font, bold: true }, alignment: { vertical: 'middle' } }
export const band: Partial<Style> = {
  font: { ...font, bold: true },
  fill: solid('E8E2D4'),
  border: { top: rule, bottom: hairline },
  alignment: { vertical: 'middle' },
}
export const head: Partial<Style> = {
  font: { ...font, bold: true },
  fill: solid('F1ECE0'),
  border: { top: rule, bottom: hairline },
  alignment: { vertical: 'middle', horizontal: 'right', wrapText: true, indent: 1 },
}
export const headLeft: Partial<Style> = {
  ...head,
  alignment: { vertical: 'middle', horizontal: 'left', wrapText: true },
}
export const subHead: Partial<Style> = {
  font: { ...font, color: inkSoft },
  border: lines,
  alignment: { vertical: 'top', horizontal: 'right', wrapText: true, indent: 1 },
}
export const rowLabel: Partial<Style> = { font, border: lines, alignment: { vertical: 'middle' } }
export const rowLabelStrong: Partial<Style> = { ...rowLabel, font: { ...font, bold: true } }
export const rowLabelIndented: Partial<Style> = {
  ...rowLabel,
  alignment: { vertical: 'middle', horizontal: 'left', indent: 1 },
}
export const rowUnit: Partial<Style> = { ...rowLabel, font: { ...font, color: inkSoft } }
export const centred: Partial<Style> = { ...rowLabel, alignment: { vertical: 'middle', horizontal: 'center' } }
/** The indent keeps the last digit off the mark on the edge of the next cell. */
export const figure: Partial<Style> = { ...rowLabel, alignment: { vertical: 'middle', horizontal: 'right', indent: 1 } }
export const listText: Partial<Style> = { ...rowLabel, alignment: { vertical: 'top', wrapText: true } }
export const listFigure: Partial<Style> = {
  ...rowLabel,
  alignment: { vertical: 'top', horizontal: 'right', indent: 1 },
}

const centre = { vertical: 'middle', horizontal: 'center' } as const
const muted = { ...font, color: colour('616A63') }
const oddsEdge = { style: 'double', color: colour('B3204D') } as const

/**
 * Fill and edge of each state. Fills are nearly equal in grey, so the edge carries it there: solid given, dotted solvable,
 * hatched with a dot unknown, double edge and double underline at odds.
 */
export const stateStyles: { readonly [S in ExportState]: Partial<Style> } = {
  given: { ...figure, fill: solid('F6E7BF'), border: { ...lines, left: { style: 'thick', color: colour('A9761A') } } },
  solvable: {
    ...figure,
    fill: solid('E0F1E6'),
    border: { ...lines, left: { style: 'mediumDashDotDot', color: colour('2C8A63') } },
  },
  unknown: {
    ...figure,
    font: { ...muted, bold: true },
    fill: { type: 'pattern', pattern: 'lightUp', fgColor: colour('A89C7E'), bgColor: colour('FFFFFF') },
    alignment: centre,
  },
  atOdds: {
    ...figure,
    font: { ...font, underline: 'double' },
    fill: solid('FBE0E6'),
    border: { top: oddsEdge, bottom: oddsEdge, left: oddsEdge },
  },
  absent: { ...figure, font: muted, alignment: centre },
  noMolarMass: { ...figure, font: { ...muted, italic: true }, alignment: centre },
}

/** What stands in a cell without a number. Never blank: a blank could be taken for a zero. */
export const stateMarks: { readonly [S in ExportState]: string } = {
  given: '',
  solvable: '',
  unknown: '·',
  atOdds: '!',
  absent: '–',
  noMolarMass: 'n/a',
}
