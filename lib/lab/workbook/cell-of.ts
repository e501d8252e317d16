import type ExcelJS from 'exceljs'
import { plainDecimal, shiftDecimal } from '@/lib/book/decimal-text'
import type { Cell } from '../table/grid'

/** A workbook's cell as a cell of a grid; `missing` where it is a formula without a stored result. */
export function cellOf(cell: ExcelJS.Cell): Cell {
  return cellFrom(cell.value, cell.numFmt)
}

function cellFrom(value: ExcelJS.CellValue, format: string | undefined): Cell {
  if (value === null || value === undefined) return ''
  if (typeof value === 'string') return value
  if (typeof value === 'number') return numberCell(value, format)
  if (typeof value === 'boolean') return String(value).toUpperCase()
  if (value instanceof Date) return dateCell(value)
  if ('richText' in value) return value.richText.map(({ text }) => text).join('')
  if ('error' in value) return value.error
  if ('formula' in value || 'sharedFormula' in value) {
    const { result } = value as { result?: ExcelJS.CellValue }
    const formula = ('formula' in value && value.formula) || ('sharedFormula' in value && value.sharedFormula) || ''
    return result === undefined || result === null ? { text: `=${formula}`, missing: true } : cellFrom(result, format)
  }
  if ('hyperlink' in value) {
    const text: unknown = value.text
    return typeof text === 'string' ? text : cellFrom(text as ExcelJS.CellValue, format)
  }
  return ''
}

function numberCell(value: number, format: string | undefined): Cell {
  if (!Number.isFinite(value)) return String(value)
  // Text within quotes or brackets of a format is not the percent sign that multiplies.
  const bare = (format ?? '').replace(/"[^"]*"|\\.|\[[^\]]*\]/g, '')
  // Spreadsheets store 15 figures; what is beyond is noise of binary fractions.
  const number = Number(value.toPrecision(15))
  if (!bare.includes('%')) return { text: plainDecimal(number), number }
  const percent = Number(shiftDecimal(number, 2).toPrecision(15))
  return { text: `${plainDecimal(percent)}%`, number: percent, percent: true }
}

/** The wall clock of the sheet: exceljs puts it into the hours of UTC, so no zone may shift it. */
function dateCell(value: Date): Cell {
  // Serial numbers carry fractions of a second that are only rounding.
  const rounded = new Date(Math.round(value.getTime() / 1000) * 1000)
  if (Number.isNaN(rounded.getTime())) return '#VALUE!'
  const [day = '', clock = ''] = rounded.toISOString().slice(0, 19).split('T')
  const time = clock.endsWith(':00') ? clock.slice(0, 5) : clock
  // A time of day alone stands on the day the calendar begins with.
  if (day <= '1900-01-01') return { text: time, date: `T${time}` }
  const text = clock === '00:00:00' ? day : `${day}T${time}`
  return { text, date: text }
}
