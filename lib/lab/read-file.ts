import { limits } from './limits'
import type { LabAnswer, LabOptions } from './model'
import { readGrids } from './read-grids'
import { readLabText } from './read-text'
import { decodeText, fileKind } from './source/decode'

/**
 * Reads laboratory tables from a file: .csv, .tsv, .txt or .xlsx, told apart by content, never by name.
 * The workbook reader is loaded when one comes.
 * @returns the reading, or problems where no table can be read.
 */
export async function readLabFile(bytes: Uint8Array, options: LabOptions = {}): Promise<LabAnswer> {
  if (bytes.length > limits.bytes) return { ok: false, problems: ['The file is larger than 20 MB. Split it.'] }
  if (bytes.length === 0) return { ok: false, problems: ['The file is empty.'] }
  const kind = fileKind(bytes)
  if (typeof kind === 'object') return { ok: false, problems: [kind.refused] }
  if (kind === 'zip') {
    const { readWorkbook } = await import('./workbook/read-workbook')
    const workbook = await readWorkbook(bytes)
    return workbook.ok ? readGrids(workbook.grids, options, workbook.listed) : workbook
  }
  const text = decodeText(bytes)
  return text === undefined ? { ok: false, problems: ['This is no text and no workbook.'] } : readLabText(text, options)
}
