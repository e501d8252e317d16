/** Numbers as people type them, in decimal: never 0.19399999 where 0.194 is meant. */

/** `value` times ten to `places`, moved in decimal: 0.00194 by 2 is 0.194. */
export function shiftDecimal(value: number, places: number): number {
  const [mantissa = '0', exponent = '0'] = String(value).split('e')
  return Number(`${mantissa}e${Number(exponent) + places}`)
}

/** The shortest decimal text that reads back as the same number, without an exponent while it stays readable. */
export function plainDecimal(value: number): string {
  const text = String(value)
  const [mantissa = '', exponent] = text.split('e')
  if (exponent === undefined) return text
  const power = Number(exponent)
  if (power < -12 || power > 20) return text
  const negative = mantissa.startsWith('-')
  const [whole = '', fraction = ''] = mantissa.replace('-', '').split('.')
  const digits = whole + fraction
  const point = whole.length + power
  const plain =
    point <= 0
      ? `0.${'0'.repeat(-point)}${digits}`
      : point >= digits.length
        ? digits + '0'.repeat(point - digits.length)
        : `${digits.slice(0, point)}.${digits.slice(point)}`
  return negative ? `-${plain}` : plain
}
