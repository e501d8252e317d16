import type { Worksheet } from 'exceljs'
import { address, putLive } from './xlsx-cells'
import * as style from './xlsx-styles'

/** A cell that formulas lean on, with the number it holds now; null: it holds none. */
export type Ref = { at: string; value: number | null }

/** A sum that is a number only when every cell in it is. No formula: the value is written as it is. */
export type Amount = { formula: string | null; value: number | null }

/** How many of some cells hold a number, and their sum, as pieces of a formula. */
export type Gathered = { count: string; sum: string; refs: readonly Ref[] }

export const unknownText = 'unknown'
export const nothing: Amount = { formula: null, value: 0 }

/**
 * A formula may have 255 arguments and 8192 characters, and a cell of another sheet takes about 25 of them. Longer lists are
 * gathered part by part in cells to the right of the table, from `column` on.
 */
const partLength = 100

export function gather(sheet: Worksheet, row: number, column: number, refs: readonly Ref[]): Gathered {
  if (refs.length === 0) return { count: '0', sum: '0', refs }
  const list = (part: readonly Ref[]): string => part.map(({ at }) => at).join(',')
  if (refs.length <= partLength) return { count: `COUNT(${list(refs)})`, sum: `SUM(${list(refs)})`, refs }
  const counts: string[] = []
  const sums: string[] = []
  for (let from = 0; from < refs.length; from += partLength) {
    const part = refs.slice(from, from + partLength)
    const at = column + 2 * counts.length
    const known = part.filter(({ value }) => value !== null)
    const cells = sheet.getRow(row)
    putLive(cells.getCell(at), { formula: `COUNT(${list(part)})`, result: known.length }, '0', style.rowUnit)
    const formula = `IF(${address(at, row)}=${part.length},SUM(${list(part)}),"${unknownText}")`
    putLive(cells.getCell(at + 1), { formula, result: sumOf(part) ?? unknownText }, 'General', style.rowUnit)
    counts.push(address(at, row))
    sums.push(address(at + 1, row))
  }
  return { count: `SUM(${counts.join(',')})`, sum: `SUM(${sums.join(',')})`, refs }
}

/** The sum, or "unknown" while a cell of it holds no number. */
export function whole({ count, sum, refs }: Gathered): Amount {
  if (refs.length === 0) return nothing
  return { formula: `IF(${count}=${refs.length},${sum},"${unknownText}")`, value: sumOf(refs) }
}

export const sumOf = (refs: readonly Ref[]): number | null =>
  refs.reduce<number | null>((sum, { value }) => (sum === null || value === null ? null : sum + value), 0)

export const unknownIn = (refs: readonly Ref[]): number => refs.filter(({ value }) => value === null).length
