/** Arithmetic modulo a prime below 2^26, so that products are exact: an oracle's rank needs no tolerance. */
export const PRIME = 67_108_859

export const residue = (value: number): number => ((value % PRIME) + PRIME) % PRIME
export const times = (a: number, b: number): number => (a * b) % PRIME

export function inverse(a: number): number {
  let [r, next, s, following] = [PRIME, residue(a), 0, 1]
  while (next !== 0) {
    const q = Math.floor(r / next)
    ;[r, next] = [next, r - q * next]
    ;[s, following] = [following, s - q * following]
  }
  return residue(s)
}
export const over = (a: number, b: number): number => times(residue(a), inverse(b))

/** x = transfer x + feed, modulo the prime; for a matrix that is regular. */
export function solveModulo(transfer: number[][], feed: number[]): number[] {
  const n = feed.length
  const rows = transfer.map((row, i) => [...row.map((value, j) => residue(Number(i === j) - value)), feed[i] as number])
  const { pivots } = reduceModulo(rows)
  const x = new Array<number>(n).fill(0)
  for (const [j, row] of pivots) if (j < n) x[j] = row[n] as number
  return x
}

/** Reduced row-echelon form: column of each pivot with its row; changes the rows. */
export function reduceModulo(rows: number[][]): { pivots: [number, number[]][] } {
  const pivots: [number, number[]][] = []
  for (const row of rows) {
    for (const [j, other] of pivots) subtract(row, row[j] as number, other)
    const j = row.findIndex((value) => value !== 0)
    if (j < 0) continue
    const factor = inverse(row[j] as number)
    for (let k = 0; k < row.length; k++) row[k] = times(row[k] as number, factor)
    for (const [, other] of pivots) subtract(other, other[j] as number, row)
    pivots.push([j, row])
  }
  return { pivots }
}

function subtract(row: number[], factor: number, other: readonly number[]): void {
  if (factor === 0) return
  for (let k = 0; k < row.length; k++)
    if (other[k] !== 0) row[k] = residue((row[k] as number) - times(factor, other[k] as number))
}
