import { limits } from '../limits'
import type { Cell, Grid, Separator } from '../table/grid'
import { findSeparator, splitText } from './separator'
import { splitBySpaces } from './split-spaces'

/**
 * A text as one grid. Rows are numbered as the lines of the text, a row of several lines by its first.
 * @returns problems (plain sentences) where it is empty, has one column or is too large.
 */
export function textGrid(text: string): { ok: true; grid: Grid } | { ok: false; problems: string[] } {
  let plain = text
    .replace(/^\ufeff/, '')
    .replace(/\r\n?/g, '\n')
    .replace(/[\u0085\u2028\u2029\v\f]/g, ' ')
  if (plain.trim() === '') return { ok: false, problems: ['There is nothing in it.'] }
  const told = /^"?sep=([\t;,|])"?\n/i.exec(plain)
  if (told) plain = plain.slice(told[0].length)
  const separator = (told?.[1] as Separator | undefined) ?? findSeparator(plain)
  if (separator === undefined)
    return { ok: false, problems: ['No table was found: the lines are not parted by tabs, ; , | or two spaces.'] }
  const fields = separator === 'spaces' ? undefined : countSigns(plain, separator)
  if (fields !== undefined && fields > limits.cells * 2) return tooLarge()
  const rows: Cell[][] = separator === 'spaces' ? splitBySpaces(plain.split('\n')) : splitText(plain, separator)
  let cells = 0
  let line = told ? 2 : 1
  const rowNumbers = rows.map((row) => {
    const start = line
    line += 1
    cells += row.length
    for (const cell of row) if (typeof cell === 'string' && cell.includes('\n')) line += cell.split('\n').length - 1
    return start
  })
  if (cells > limits.cells || rows.some((row) => row.length > limits.columns)) return tooLarge()
  const filled = rows.filter((row) => row.some((cell) => (cell as string).trim() !== '')).length
  if (filled > limits.rows + 1)
    return { ok: false, problems: [`The table has more than ${limits.rows.toLocaleString('en')} rows. Split it.`] }
  return { ok: true, grid: { rows, rowNumbers, separator } }
}

const tooLarge = () => ({
  ok: false as const,
  problems: [`The table has more than ${limits.cells.toLocaleString('en')} cells. Split it.`],
})

function countSigns(text: string, sign: string): number {
  let count = 0
  for (let at = text.indexOf(sign); at >= 0; at = text.indexOf(sign, at + 1)) count++
  return count
}
