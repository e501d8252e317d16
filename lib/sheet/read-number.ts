/** A number as people type it, by their decimal sign, with how finely it was typed. Nothing is guessed. */

export type DecimalSign = 'point' | 'comma'

export type NumberRead =
  | {
      ok: true
      value: number
      /** Half a unit in the last typed digit: "24.00" gives 0.005; null where that is too small to tell from 0. */
      halfWidth: number | null
      /** What stands behind the number, trimmed. */
      rest: string
    }
  | { ok: false; reason: string }

const SPACES = ' \u00a0\u2007\u2009\u202f'
const APOSTROPHES = "'’"
const MINUS = /^[-\u2212\u2013\uff0d]/
const EXPONENT = /^(?:[eE]|\s?[×x*·]\s?10\^?)([-+\u2212\u2013]?\d+|[⁻⁺]?[⁰¹²³⁴⁵⁶⁷⁸⁹]+)(?![\d.,])/
const RAISED = '⁰¹²³⁴⁵⁶⁷⁸⁹'

const refuse = (reason: string): NumberRead => ({ ok: false, reason })

/**
 * Reads the number that `text` starts with. Thousands may be spaced or have apostrophes; the other decimal sign is
 * refused with how to type it, and where it could be either a decimal sign or thousands both readings are named.
 */
export function readNumber(text: string, decimal: DecimalSign): NumberRead {
  let left = text.trim()
  const negative = MINUS.test(left)
  if (negative || left.startsWith('+')) left = left.slice(1).trimStart()
  const token = /^[\d.,]*/.exec(left)?.[0] ?? ''
  if (!/\d/.test(token))
    return refuse(`This is not a number. Type one such as ${decimal === 'comma' ? '12,5' : '12.5'}; a unit may follow.`)
  const mantissa = readMantissa(left, decimal)
  if (typeof mantissa === 'string') return refuse(mantissa)
  left = left.slice(mantissa.length)
  let exponent = 0
  const power = EXPONENT.exec(left)
  if (power) {
    exponent = exponentOf(power[1] ?? '')
    left = left.slice(power[0].length)
  }
  const digits = mantissa.whole + mantissa.fraction
  const last = exponent - mantissa.fraction.length
  const size = Number(`${digits}e${last}`)
  if (!Number.isFinite(size)) return refuse('This number is too large to calculate with.')
  if (size === 0 && /[1-9]/.test(digits)) return refuse('This number is too small to tell from 0.')
  const halfWidth = Number(`5e${last - 1}`)
  return {
    ok: true,
    value: negative && size !== 0 ? -size : size,
    halfWidth: halfWidth > 0 && Number.isFinite(halfWidth) ? halfWidth : null,
    rest: left.trim(),
  }
}

type Mantissa = { whole: string; fraction: string; length: number }

function readMantissa(text: string, decimal: DecimalSign): Mantissa | string {
  const [sign, other] = decimal === 'point' ? ['.', ','] : [',', '.']
  const spaced = new RegExp(`^\\d{1,3}(?:([${SPACES}${APOSTROPHES}])\\d{3})(?:\\1\\d{3})*(?!\\d)`).exec(text)?.[0]
  const start = spaced ?? /^[\d.,]+/.exec(text)?.[0] ?? ''
  if (spaced !== undefined) {
    const tail = /^[.,][\d.,]*/.exec(text.slice(spaced.length))?.[0] ?? ''
    const whole = spaced.replace(/\D/g, '')
    if (tail === '') return { whole, fraction: '', length: spaced.length }
    const fraction = tail.slice(1)
    if (!/^\d*$/.test(fraction)) return `“${spaced}${tail}” is not one number.`
    if (tail[0] === other) return otherSign(`${whole}${tail}`, other, sign)
    return { whole, fraction, length: spaced.length + tail.length }
  }
  const again = new RegExp(`^[${SPACES}${APOSTROPHES}]*\\d`).exec(text.slice(start.length))
  if (again) return `“${text}” is more than one number: thousands are groups of three digits, as in 50 000.`
  const parts = start.split(other)
  if (parts.length === 1) return plain(start, sign)
  const grouped = parts.slice(1)
  const lastPart = grouped[grouped.length - 1] ?? ''
  const [lastWhole = '', ...fractions] = lastPart.split(sign)
  const groups = [...grouped.slice(0, -1), lastWhole]
  const isGrouped = /^[1-9]\d{0,2}$/.test(parts[0] ?? '') && groups.every((group) => /^\d{3}$/.test(group))
  if (!isGrouped || fractions.length > 1)
    return parts.length === 2 && /^\d*$/.test(lastPart) && /^\d*$/.test(parts[0] ?? '')
      ? otherSign(start, other, sign)
      : `“${start}” is not one number.`
  const whole = `${parts[0]}${groups.join('')}`
  if (groups.length === 1 && fractions.length === 0)
    return `“${start}” can be read as ${parts[0]}\u00a0${groups[0]} or as ${parts[0]}${sign}${groups[0]}: type ${whole} or ${parts[0]}${sign}${groups[0]}.`
  return { whole, fraction: fractions[0] ?? '', length: start.length }
}

function plain(text: string, sign: string): Mantissa | string {
  const [whole = '', fraction = '', ...more] = text.split(sign)
  if (more.length > 0) return `“${text}” is not one number: it has more than one decimal sign.`
  return { whole: whole === '' ? '0' : whole, fraction, length: text.length }
}

function otherSign(text: string, other: string, sign: string): string {
  const name = sign === '.' ? 'point' : 'comma'
  const otherName = sign === '.' ? 'comma' : 'point'
  return `“${text}” has a decimal ${otherName}, and a decimal ${name} is set: type ${text.replace(other, sign)}.`
}

function exponentOf(text: string): number {
  const raised = [...text].map((character) => {
    const digit = RAISED.indexOf(character)
    if (digit >= 0) return String(digit)
    return /[-\u2212\u2013⁻]/.test(character) ? '-' : /[+⁺]/.test(character) ? '' : character
  })
  return Number(raised.join(''))
}
