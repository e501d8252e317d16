import { plainDecimal } from '@/lib/book/decimal-text'
import type { DecimalSign } from './read-number'

/**
 * Numbers as the stream table shows them: thousands spaced, digits by size, a real minus, never 0 for what is not 0.
 * Values come in the unit that the row shows.
 */

/** No-break space as wide as a digit's cell, so that figures stay under each other. */
const THOUSANDS = '\u00a0'
const MINUS = '\u2212'

/** What a row shows: flows and amounts; percentages; fractions of 1. */
export type NumberStyle = 'flow' | 'percent' | 'fraction'

export type FormatOptions = {
  decimal?: DecimalSign
  /** A value as typed: no typed digit is dropped, up to nine significant ones. */
  typed?: boolean
  /** Half a unit in the last typed digit, in the row's unit: that digit is shown even when it is 0. */
  halfWidth?: number | null
  /** So many significant digits instead of those that the size asks for; whole digits are never dropped. */
  digits?: number | null
  /** A further digit or more, as the cell card shows. */
  extraDigits?: number
}

export function formatNumber(value: number, style: NumberStyle, options: FormatOptions = {}): string {
  if (!Number.isFinite(value)) return '?'
  const { decimal = 'point', typed = false, halfWidth = null, extraDigits = 0, digits = null } = options
  const size = Math.abs(value)
  const sign = value < 0 ? MINUS : ''
  if (size !== 0 && (size < 1e-4 || size >= 1e12))
    return sign + withExponent(size, (digits ?? 3) + extraDigits, decimal)
  let decimals = (digits === null ? decimalsOf(size, style) : decimalsFor(size, digits)) + extraDigits
  if (size === 0 || (style === 'percent' && size === 100)) decimals = extraDigits
  if (typed) decimals = Math.max(decimals, decimalsTyped(size))
  if (halfWidth !== null && halfWidth > 0) decimals = Math.max(decimals, Math.ceil(-Math.log10(2 * halfWidth) - 1e-9))
  const text = size.toFixed(Math.min(Math.max(decimals, 0), 15))
  const [whole = '', fraction] = text.split('.')
  const spaced = whole.replace(/\B(?=(\d{3})+$)/g, THOUSANDS)
  return sign + (fraction === undefined ? spaced : `${spaced}${decimal === 'comma' ? ',' : '.'}${fraction}`)
}

/** Full precision for the clipboard: the shortest decimal that reads back as the same number, no thousands. */
export function plainNumber(value: number, decimal: DecimalSign = 'point'): string {
  const text = plainDecimal(value)
  return decimal === 'comma' ? text.replace('.', ',') : text
}

function decimalsOf(size: number, style: NumberStyle): number {
  if (size === 0) return 0
  switch (style) {
    case 'flow':
      // Compared after rounding, so that 999.97 is 1 000 and not 1000.0.
      if (size >= 999.95) return 0
      if (size >= 9.995) return 1
      if (size >= 0.9995) return 2
      return significant(size, 3)
    case 'percent':
      return size >= 0.0995 ? 2 : Math.max(2, significant(size, 2))
    case 'fraction':
      return size >= 0.000995 ? 4 : Math.max(4, significant(size, 2))
  }
}

/** Decimals that show `digits` significant ones, counted after rounding: 9.999 with three is 10.0. */
function decimalsFor(size: number, digits: number): number {
  if (size === 0) return 0
  const exponent = Number(size.toExponential(digits - 1).split('e')[1])
  return Math.max(0, digits - 1 - exponent)
}

/** Decimals that show `digits` significant ones, without closing zeros that say nothing. */
function significant(size: number, digits: number): number {
  const decimals = digits - 1 - Math.floor(Math.log10(size))
  const typed = decimalsTyped(size)
  return Math.min(decimals, Math.max(typed, 0))
}

/** Decimals of the shortest text of this number, where it has at most nine significant digits; else 0. */
function decimalsTyped(size: number): number {
  const rounded = Number(size.toPrecision(12))
  const text = plainDecimal(rounded)
  if (/e/.test(text)) return 0
  const [whole = '', fraction = ''] = text.split('.')
  const digits = (whole + fraction).replace(/^0+/, '').length
  return digits <= 9 ? fraction.length : Math.max(0, fraction.length - (digits - 9))
}

function withExponent(size: number, digits: number, decimal: DecimalSign): string {
  const [mantissa = '', power = ''] = size.toExponential(digits - 1).split('e')
  const shown = decimal === 'comma' ? mantissa.replace('.', ',') : mantissa
  return `${shown}e${power.replace('+', '').replace('-', MINUS)}`
}
