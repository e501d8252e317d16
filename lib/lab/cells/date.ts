import type { DateOrder } from '../model'
import { plainSpaces } from './spaces'

/** A date as written, both ways; equal or one missing where it says itself which it is. `time` is '' or "T06:00". */
export type WrittenDate = { dmy?: string; mdy?: string; time: string }

const MONTHS: Record<string, number> = {}
for (const [index, names] of [
  'jan januar january jän jänner',
  'feb februar february',
  'mar märz mär mrz march maerz',
  'apr april',
  'may mai',
  'jun juni june',
  'jul juli july',
  'aug august',
  'sep sept september',
  'oct okt oktober october',
  'nov november',
  'dec dez dezember december',
].entries())
  for (const name of names.split(' ')) MONTHS[name] = index + 1

const TIME =
  /^(?:[T ,;]+|^)(?:um |at )?(\d{1,2})[:.h](\d{2})(?::(\d{2})(?:[.,]\d+)?)?(?: ?(am|pm|a\.m\.|p\.m\.))?(?: ?(?:uhr|h|hrs))?(?: ?(z|utc|[+-]\d{2}:?\d{2}))?$/i

/** Reads a time of day: "06:00", "6:30 PM", "06:00 Uhr" become "T06:00"; undefined where it is none. */
export function readTime(text: string): string | undefined {
  const spelled = plainSpaces(text)
  if (spelled === '') return ''
  const found = TIME.exec(spelled)
  if (!found) return undefined
  let hour = Number(found[1])
  const half = found[4]?.toLowerCase().replace(/\./g, '')
  if (half && (hour < 1 || hour > 12)) return undefined
  if (half) hour = (hour % 12) + (half === 'pm' ? 12 : 0)
  if (hour > 23 || Number(found[2]) > 59 || Number(found[3] ?? 0) > 59) return undefined
  const zone = found[5] ? (/^(?:z|utc)$/i.test(found[5]) ? 'Z' : found[5].replace(/^(...)(\d\d)$/, '$1:$2')) : ''
  return `T${two(hour)}:${found[2]}${found[3] ? `:${found[3]}` : ''}${zone}`
}

/** Reads a date with or without a time of day, in both orders where the writing leaves both open. */
export function readDate(text: string): WrittenDate | undefined {
  const spelled = plainSpaces(text).replace(/^(?:mo|tu|di|we|mi|th|do|fr|sa|su|so)[a-zä]{0,8}[.,]{1,2} ?/i, '')
  if (spelled.length > 48) return undefined
  const first = /^(\d{4})([-/.])(\d{1,2})\2(\d{1,2})(?!\d)/.exec(spelled)
  if (first) return certain(spelled.slice(first[0].length), Number(first[1]), Number(first[3]), Number(first[4]))
  const packed = /^(\d{4})(\d{2})(\d{2})(?!\d)/.exec(spelled)
  if (packed) return certain(spelled.slice(8), Number(packed[1]), Number(packed[2]), Number(packed[3]))
  const named = /^(\d{1,2})(?:st|nd|rd|th)?[-./ ]{1,2}([A-Za-zä]{3,9})\.?[-./ ,]{1,2}(\d{4}|\d{2})(?!\d)/.exec(spelled)
  if (named) return certain(spelled.slice(named[0].length), yearOf(named[3]), monthOf(named[2]), Number(named[1]))
  const american = /^([A-Za-zä]{3,9})\.? (\d{1,2})(?:st|nd|rd|th)?,? (\d{4})(?!\d)/.exec(spelled)
  if (american)
    return certain(spelled.slice(american[0].length), yearOf(american[3]), monthOf(american[1]), Number(american[2]))
  const numbers = /^(\d{1,2})([-/.])(\d{1,2})\2(\d{4}|\d{2})(?!\d)/.exec(spelled)
  if (!numbers) return undefined
  const time = readTime(spelled.slice(numbers[0].length).trim())
  if (time === undefined) return undefined
  const [left, right, year] = [Number(numbers[1]), Number(numbers[3]), yearOf(numbers[4])]
  const dmy = isoDate(year, right, left)
  // Points part day, month and year in the day-first order alone.
  const mdy = numbers[2] === '.' ? dmy : isoDate(year, left, right)
  if (dmy === undefined && mdy === undefined) return undefined
  return { ...(dmy && { dmy }), ...(mdy && { mdy }), time }
}

/** The order that the date itself proves. */
export function orderOf(date: WrittenDate): DateOrder | undefined {
  return date.dmy === undefined ? 'mdy' : date.mdy === undefined ? 'dmy' : undefined
}

/** The date in ISO, or undefined where it hangs on an order that is not decided. */
export function settleDate(date: WrittenDate, order: DateOrder | null): string | undefined {
  const { dmy, mdy } = date
  const day = dmy === undefined || mdy === undefined || dmy === mdy ? (dmy ?? mdy) : order ? date[order] : undefined
  return day === undefined ? undefined : `${day}${date.time}`
}

function certain(rest: string, year: number, month: number, day: number): WrittenDate | undefined {
  const time = readTime(rest.trim())
  const iso = isoDate(year, month, day)
  return time === undefined || iso === undefined ? undefined : { dmy: iso, mdy: iso, time }
}

const two = (value: number): string => String(value).padStart(2, '0')
const monthOf = (name = ''): number => MONTHS[name.toLowerCase()] ?? 0
/** Two digits: this century until 79 (common practice of spreadsheets is similar). */
const yearOf = (text = ''): number =>
  text.length === 2 ? Number(text) + (Number(text) < 80 ? 2000 : 1900) : Number(text)

function isoDate(year: number, month: number, day: number): string | undefined {
  if (month < 1 || month > 12 || day < 1 || year < 1900 || year > 2199) return undefined
  const last = new Date(Date.UTC(year, month, 0)).getUTCDate()
  return day > last ? undefined : `${year}-${two(month)}-${two(day)}`
}
