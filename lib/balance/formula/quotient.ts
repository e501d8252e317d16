import { combine, constantForm, isConstant, type LinearForm } from '../measure/measure'

/** A ratio of two linear forms, the only shape that rows can take up. */
export type Quotient = { top: LinearForm; bottom: LinearForm }

/** Gives the value of a quotient that is the same in every solution so far, else undefined. */
export type Known = (quotient: Quotient) => number | undefined

const one = constantForm(1)
export const constantQuotient = (value: number): Quotient => ({ top: constantForm(value), bottom: one })

/** The number that a quotient is, where both forms are constants. */
export function numberOf({ top, bottom }: Quotient): number | undefined {
  return isConstant(top) && isConstant(bottom) ? top.constant / bottom.constant : undefined
}

/** k with left = k x right as forms, else undefined. Differences of rounding are passed over. */
export function proportion(left: LinearForm, right: LinearForm): number | undefined {
  if (left.columns.length !== right.columns.length) return undefined
  let k: number | undefined
  const entries = new Map(right.columns.map((column, q) => [column, right.coefficients[q] as number]))
  for (let q = 0; q < left.columns.length; q++) {
    const other = entries.get(left.columns[q] as number)
    if (other === undefined) return undefined
    const its = (left.coefficients[q] as number) / other
    if (k !== undefined && Math.abs(its - k) > 1e-14 * Math.abs(k)) return undefined
    k ??= its
  }
  if (k === undefined) return right.constant !== 0 ? left.constant / right.constant : undefined
  return Math.abs(left.constant - k * right.constant) <= 1e-14 * Math.abs(left.constant) ? k : undefined
}

const scale = (factor: number, form: LinearForm): LinearForm => combine(factor, form, 0, constantForm(0))

/** Sum of two quotients, undefined where it is no quotient of linear forms. */
export function add(left: Quotient, right: Quotient, sign: 1 | -1): Quotient | undefined {
  const k = proportion(left.bottom, right.bottom)
  if (k !== undefined) return { top: combine(1, left.top, sign * k, right.top), bottom: left.bottom }
  const a = numberOf(left)
  if (a !== undefined) return { top: combine(a, right.bottom, sign, right.top), bottom: right.bottom }
  const b = numberOf(right)
  if (b !== undefined) return { top: combine(1, left.top, sign * b, left.bottom), bottom: left.bottom }
  return undefined
}

/** Product of two quotients, with forms that stand above and below cancelled. */
export function multiply(left: Quotient, right: Quotient): Quotient | undefined {
  const across = proportion(left.top, right.bottom)
  if (across !== undefined) return { top: scale(across, right.top), bottom: left.bottom }
  const back = proportion(right.top, left.bottom)
  if (back !== undefined) return { top: scale(back, left.top), bottom: right.bottom }
  const top = product(left.top, right.top)
  const bottom = product(left.bottom, right.bottom)
  return top && bottom ? { top, bottom } : undefined
}

function product(left: LinearForm, right: LinearForm): LinearForm | undefined {
  if (isConstant(left)) return scale(left.constant, right)
  return isConstant(right) ? scale(right.constant, left) : undefined
}

export const invert = ({ top, bottom }: Quotient): Quotient => ({ top: bottom, bottom: top })

export function power(base: Quotient, exponent: Quotient): Quotient | undefined {
  const k = numberOf(exponent)
  if (k === undefined) return undefined
  const value = numberOf(base)
  if (value !== undefined) return constantQuotient(value ** k)
  if (k === 1) return base
  if (k === -1) return invert(base)
  return k === 0 ? constantQuotient(1) : undefined
}

/**
 * The one linear form that is 0 where the two sides are equal, after cross-multiplying; undefined where that is not
 * linear, even with what is known put in.
 */
export function equate(left: Quotient, right: Quotient, known: Known): LinearForm | undefined {
  const plain = crossed(left, right)
  if (plain) return plain
  const a = known(left)
  if (a !== undefined) return crossed(constantQuotient(a), right)
  const b = known(right)
  if (b !== undefined) return crossed(left, constantQuotient(b))
  for (const side of [0, 1]) {
    const [its, other] = side === 0 ? [left, right] : [right, left]
    for (const place of ['top', 'bottom'] as const) {
      const value = known({ top: its[place], bottom: one })
      if (value === undefined || value === 0) continue
      const linear = crossed({ ...its, [place]: constantForm(value) }, other)
      if (linear) return linear
    }
  }
  return undefined
}

function crossed(left: Quotient, right: Quotient): LinearForm | undefined {
  const k = proportion(left.bottom, right.bottom)
  if (k !== undefined) return combine(1, left.top, -k, right.top)
  const top = proportion(left.top, right.top)
  if (top !== undefined && top !== 0 && !isConstant(left.top)) return combine(top, right.bottom, -1, left.bottom)
  const up = product(left.top, right.bottom)
  const down = product(right.top, left.bottom)
  return up && down ? combine(1, up, -1, down) : undefined
}
