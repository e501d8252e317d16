import Papa from 'papaparse'
import type { DecimalSign } from './read-number'

/** Blocks of cells to and from the clipboard, as any spreadsheet writes and reads them: tab-separated text and an HTML table. */

export type ClipboardBlock = {
  rows: string[][]
  /** Known where the block was copied here; undefined: the reader's own decimal sign. */
  decimal?: DecimalSign
}

/** Anything that parses HTML: the browser's `new DOMParser()`. */
export type HtmlParser = { parseFromString(html: string, type: 'text/html'): Document }

/** The block on the clipboard. Text first, since it carries what the cells say; the table where there is no text. */
export function readClipboard(content: { text?: string; html?: string }, parser: HtmlParser): ClipboardBlock {
  const table = content.html ? firstTable(content.html, parser) : undefined
  const decimal = table?.getAttribute('data-decimal')
  const rows = content.text ? parseTsv(content.text) : table ? rowsOfTable(table) : []
  return { rows, ...((decimal === 'point' || decimal === 'comma') && { decimal }) }
}

/** Rows of tab-separated text; quoted cells may hold tabs, line ends and quotes. One closing line end is not a row. */
export function parseTsv(text: string): string[][] {
  const lines = text.replace(/\r\n?/g, '\n').replaceAll('\u0000', '')
  const body = lines.endsWith('\n') ? lines.slice(0, -1) : lines
  if (body === '') return lines === '' ? [] : [['']]
  const parsed = Papa.parse<string[]>(body, { delimiter: '\t', newline: '\n', quoteChar: '"' })
  // A cell that merely starts with a quote is no quoted cell: then quotes are text.
  if (parsed.errors.some(({ type }) => type === 'Quotes')) return body.split('\n').map((line) => line.split('\t'))
  return parsed.data
}

/** Rows of the first HTML table, or undefined when there is none. Spanned cells are empty but for their first. */
export function parseHtmlTable(html: string, parser: HtmlParser): string[][] | undefined {
  const table = firstTable(html, parser)
  return table ? rowsOfTable(table) : undefined
}

/** Every row ends its line, as spreadsheets write it: so a closing row of one empty cell is not lost. */
export function toTsv(rows: readonly (readonly string[])[]): string {
  return rows.map((row) => `${row.map(tsvCell).join('\t')}\r\n`).join('')
}

/** `decimal` says how its numbers are written, for when the block comes back here. */
export function toHtmlTable(rows: readonly (readonly string[])[], decimal: DecimalSign = 'point'): string {
  const body = rows.map((row) => `<tr>${row.map((cell) => `<td>${htmlText(cell)}</td>`).join('')}</tr>`).join('')
  return `<table data-decimal="${decimal}"><tbody>${body}</tbody></table>`
}

const tsvCell = (cell: string): string => (/[\t\n\r"]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell)

const htmlText = (text: string): string =>
  text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replace(/\r\n?|\n/g, '<br>')

function firstTable(html: string, parser: HtmlParser): Element | undefined {
  return parser.parseFromString(html, 'text/html').querySelector('table') ?? undefined
}

function rowsOfTable(table: Element): string[][] {
  const rows: string[][] = []
  const lines = [...table.querySelectorAll('tr')].filter((line) => line.closest('table') === table)
  const at = (index: number): string[] => {
    rows[index] ??= []
    return rows[index]
  }
  for (const [rowIndex, line] of lines.entries()) {
    const row = at(rowIndex)
    let column = 0
    for (const cell of [...line.children].filter(({ tagName }) => /^t[dh]$/i.test(tagName))) {
      while (row[column] !== undefined) column++
      const across = span(cell, 'colspan')
      const down = Math.min(span(cell, 'rowspan'), lines.length - rowIndex)
      for (let r = 0; r < down; r++) for (let c = 0; c < across; c++) at(rowIndex + r)[column + c] = ''
      row[column] = cellText(cell)
      column += across
    }
  }
  return rows.map((row) => Array.from(row, (cell) => cell ?? ''))
}

/** At most 1,000: a page may claim any span. */
const span = (cell: Element, name: string): number =>
  Math.min(Math.max(Math.trunc(Number(cell.getAttribute(name) ?? 1)) || 1, 1), 1000)

function cellText(cell: Element): string {
  const pieces: string[] = []
  const walk = (node: Node): void => {
    if (node.nodeType === 3) pieces.push((node.textContent ?? '').replace(/[\t\n\r\f ]+/g, ' '))
    else if (node.nodeName.toLowerCase() === 'br') pieces.push('\n')
    else for (const child of node.childNodes) walk(child)
  }
  walk(cell)
  return pieces
    .join('')
    .replaceAll('\u00a0', ' ')
    .replace(/ ?\n ?/g, '\n')
    .trim()
}
