import { readDate, readTime } from '../cells/date'
import type { Cell } from './grid'
import { rawOf } from './grid'
import { type Ledger, noteDate, type SampleDraft } from './ledger'

/**
 * When a sample was taken, from a cell with the date and perhaps one with the time of day.
 * @returns undefined where the cells hold neither; the caller lists what was not understood.
 */
export function readTaken(
  ledger: Ledger,
  head: string,
  dateCell: Cell,
  timeCell: Cell,
): SampleDraft['taken'] | undefined {
  const time = timeOf(timeCell)
  if (time === undefined) return undefined
  const raw = [rawOf(dateCell), rawOf(timeCell)].filter((text) => text !== '').join(' ')
  if (typeof dateCell !== 'string' && dateCell.date !== undefined)
    return { head, raw, iso: dateCell.date.includes('T') ? dateCell.date : `${dateCell.date}${time}` }
  const date = readDate(rawOf(dateCell))
  if (!date) return undefined
  noteDate(ledger, date)
  return { head, raw, date: { ...date, time: date.time || time } }
}

/** "T06:00", '' for a blank cell, undefined for what is no time of day. */
function timeOf(cell: Cell): string | undefined {
  if (typeof cell !== 'string') {
    if (cell.date === undefined) return undefined
    const found = /T.*$/.exec(cell.date)
    return found ? found[0] : 'T00:00'
  }
  return readTime(cell)
}
