import { limits } from './limits'
import type { LabAnswer, LabOptions } from './model'
import { readGrids } from './read-grids'
import { isBinary } from './source/decode'
import { textGrid } from './source/text-grid'

/**
 * Reads laboratory tables from pasted text.
 * @param text any separator; lines end in any way. Rows in the answer are lines of it, from 1.
 * @param options answers to questions of an earlier reading.
 * @returns the reading, or problems where no table can be read: empty, binary, heads only, too large.
 */
export function readLabText(text: string, options: LabOptions = {}): LabAnswer {
  if (text.length > limits.bytes) return { ok: false, problems: ['The text is larger than 20 MB. Split it.'] }
  if (isBinary(text)) return { ok: false, problems: ['This is no text and no workbook.'] }
  const read = textGrid(text)
  return read.ok ? readGrids([read.grid], options) : read
}
