import type { DecimalSign } from '../model'

/**
 * A number as written, read both ways. Where only one way makes a number, the number itself is evidence for that decimal
 * sign; where both do and differ, it hangs on the table's decimal sign.
 */
export type WrittenNumber = { point?: number; comma?: number }

const EXPONENT =
  /^ ?(?:[eE]([-+−–]?\d{1,4})(?![\d.,])|[x×*·⋅] ?10 ?(?:\^ ?\(?([-+−–]?\d{1,3})\)?|([-+−–]\d{1,3})|([⁻⁺]?[⁰¹²³⁴⁵⁶⁷⁸⁹]{1,3})))/
const RAISED = '⁰¹²³⁴⁵⁶⁷⁸⁹'
const PLAIN = /^\d+$/
const GROUPED_BY_SPACE = /^[1-9]\d{0,2}(?:([ '’´`])\d{3})(?:\1\d{3})*$/

/**
 * Reads the number that `text` (spaces plain) starts with.
 * @returns the number both ways and the text behind it; undefined where it starts with none or with no sensible one.
 */
export function leadingNumber(text: string): { number: WrittenNumber; rest: string } | undefined {
  const sign = /^[-+−–‐‑﹣－] ?/.exec(text)?.[0] ?? ''
  const body = text.slice(sign.length)
  const token = /^(?:\d|[.,](?=\d))(?:[\d.,'’´`]| (?=\d))*/.exec(body)?.[0]
  if (token === undefined) return undefined
  const mantissa = token.replace(/[ '’´`]+$/, '')
  const power = EXPONENT.exec(body.slice(mantissa.length))
  const exponent = power ? exponentOf(power) : undefined
  const rest = body.slice(mantissa.length + (power?.[0].length ?? 0))
  const negative = sign !== '' && !sign.startsWith('+')
  const number = {
    ...way('point', numberFrom(mantissa, '.', ',', exponent, negative)),
    ...way('comma', numberFrom(mantissa, ',', '.', exponent, negative)),
  }
  return number.point === undefined && number.comma === undefined ? undefined : { number, rest }
}

/** The whole of `text` as a number both ways, or undefined. */
export function wholeNumber(text: string): WrittenNumber | undefined {
  const read = leadingNumber(text)
  return read && read.rest.trim() === '' ? read.number : undefined
}

/** The decimal sign that the number itself proves. */
export function evidenceOf(number: WrittenNumber): DecimalSign | undefined {
  if (number.point === undefined) return 'comma'
  if (number.comma === undefined) return 'point'
  return undefined
}

/** The value, or undefined where it hangs on a sign that is not decided. */
export function settleNumber(number: WrittenNumber, decimal: DecimalSign | null): number | undefined {
  const { point, comma } = number
  if (point === undefined || comma === undefined || point === comma) return point ?? comma
  return decimal === null ? undefined : number[decimal]
}

/** A number with one reading: a true number of a workbook. */
export function certainNumber(value: number): WrittenNumber {
  return { point: value, comma: value }
}

const way = (sign: DecimalSign, value: number | undefined): WrittenNumber =>
  value === undefined ? {} : { [sign]: value }

function numberFrom(
  mantissa: string,
  decimal: string,
  group: string,
  exponent: number | undefined,
  negative: boolean,
): number | undefined {
  const [whole = '', fraction = '', ...more] = mantissa.split(decimal)
  if (more.length > 0 || !/^\d*$/.test(fraction) || (whole === '' && fraction === '')) return undefined
  let digits = whole
  if (whole !== '' && !PLAIN.test(whole)) {
    // A grouped mantissa with a power of ten is written by nobody.
    if (exponent !== undefined) return undefined
    const groups = whole.split(group)
    const byMark = /^[1-9]\d{0,2}$/.test(groups[0] as string) && groups.slice(1).every((three) => /^\d{3}$/.test(three))
    if (!byMark && !GROUPED_BY_SPACE.test(whole)) return undefined
    digits = whole.replace(/\D/g, '')
  }
  const size = Number(`${digits || '0'}.${fraction || '0'}e${exponent ?? 0}`)
  if (!Number.isFinite(size) || (size === 0 && /[1-9]/.test(digits + fraction))) return undefined
  return negative && size !== 0 ? -size : size
}

function exponentOf(power: RegExpExecArray): number {
  const text = power[1] ?? power[2] ?? power[3]
  if (text !== undefined) return Number(text.replace(/[−–]/, '-'))
  const raised = (power[4] as string).replace('⁻', '-').replace('⁺', '')
  return Number(raised.replace(/[⁰¹²³⁴⁵⁶⁷⁸⁹]/g, (digit) => String(RAISED.indexOf(digit))))
}
