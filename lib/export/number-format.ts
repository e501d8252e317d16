/** Beyond these a plain decimal is harder to read than a power of ten. */
const mostDecimals = 8
const largestPlain = 1e12

/** Decimals that show `digits` significant figures of a value. Whole digits are never cut: 24 866 stays 24 866. */
export function decimalsFor(value: number, digits: number): number {
  if (value === 0 || !Number.isFinite(value)) return 0
  // toExponential rounds first, so that 9.9996 to four figures counts as 10.00.
  const exponent = Number(value.toExponential(digits - 1).split('e')[1])
  return Math.max(0, digits - 1 - exponent)
}

/**
 * The spreadsheet number format that shows a value to `digits` significant figures, thousands set apart by spaces. The
 * space is a literal, since the format's own thousands mark becomes a comma or a full stop on the reader's machine.
 */
export function numberFormat(value: number, digits: number): string {
  const size = Math.abs(value)
  const decimals = decimalsFor(value, digits)
  if (size !== 0 && (decimals > mostDecimals || size >= largestPlain)) return `0.${'0'.repeat(digits - 1)}E+00`
  return fixedFormat(value, decimals)
}

/** The same with a fixed number of decimals. */
export function fixedFormat(value: number, decimals: number): string {
  const whole = Math.abs(Number(value.toFixed(decimals)))
  const groups = whole < 1000 ? 0 : Math.floor(Math.log10(whole) / 3)
  const integer = groups === 0 ? '0' : `#${'\\ ###'.repeat(groups - 1)}\\ ##0`
  return decimals === 0 ? integer : `${integer}.${'0'.repeat(decimals)}`
}

/** Most figures of a typed value that are shown; more is noise of the conversion from its unit. */
const mostTyped = 9

/** The format of a typed value: the row's figures, or more where more were typed. */
export function typedFormat(value: number, digits: number): string {
  const figures = Number(value.toPrecision(12)).toExponential().split('e')[0]?.replace(/[-.]/g, '').length ?? 0
  return numberFormat(value, figures <= mostTyped ? Math.max(digits, figures) : digits)
}
