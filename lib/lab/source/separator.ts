import Papa from 'papaparse'
import type { Separator } from '../table/grid'
import { spacedFields, usualCount } from './split-spaces'

/** In order of preference: a sign that stands in no number goes before one that may. */
const candidates: [Separator, number][] = [
  ['\t', 0.15],
  [';', 0.12],
  ['|', 0.12],
  ['spaces', 0.05],
  [',', 0],
]
const SAMPLE = 64 * 1024

/** The separator that parts the lines most evenly, quotes respected; undefined where none makes two columns. */
export function findSeparator(text: string): Separator | undefined {
  const cut = text.length > SAMPLE ? text.slice(0, text.lastIndexOf('\n', SAMPLE) + 1 || SAMPLE) : text
  let best: Separator | undefined
  let most = 0
  for (const [separator, bonus] of candidates) {
    const share = evenness(cut, separator)
    if (share > 0 && share + bonus > most) [best, most] = [separator, share + bonus]
  }
  return best
}

/** The share of filled lines that have the usual number of fields, 0 where that is one. */
function evenness(text: string, separator: Separator): number {
  const rows =
    separator === 'spaces'
      ? text.split('\n').map((line) => spacedFields(line).map((field) => field.text))
      : splitText(text, separator)
  const filled = rows.filter((row) => row.some((cell) => cell.trim() !== ''))
  const usual = usualCount(filled.map((row) => row.length))
  if (usual < 2) return 0
  if (separator === 'spaces' && standsForAnother(filled)) return 0
  return filled.filter((row) => row.length === usual).length / filled.length
}

/** "a,  b,  c" and "a  |  b": the spaces only pad another separator. */
function standsForAnother(rows: string[][]): boolean {
  let fields = 0
  let padded = 0
  for (const row of rows)
    for (const field of row.slice(0, -1)) {
      fields++
      if (/[,;|\t]$/.test(field)) padded++
    }
  return padded > fields * 0.4
}

/** Text (newlines as \n) as rows of fields; a quote that is never closed is an ordinary sign. */
export function splitText(text: string, separator: Exclude<Separator, 'spaces'>): string[][] {
  const parsed = Papa.parse<string[]>(text, { delimiter: separator, newline: '\n', quoteChar: '"' })
  const broken = parsed.errors.some((error) => error.type === 'Quotes')
  return broken ? text.split('\n').map((line) => splitLine(line, separator)) : parsed.data
}

function splitLine(line: string, separator: string): string[] {
  if (!line.includes('"')) return line.split(separator)
  const parsed = Papa.parse<string[]>(line, { delimiter: separator, newline: '\n', quoteChar: '"' })
  return parsed.errors.some((error) => error.type === 'Quotes') ? line.split(separator) : (parsed.data[0] ?? [''])
}
