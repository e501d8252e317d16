/** Residuals and their gradients (one row each) at a place; undefined where it makes no sense there. */
export type Residuals = (t: Float64Array) => { rest: number[]; gradient: Float64Array[] } | undefined

const STEPS = 40
const FIRST_DAMPING = 1e-2
const LEAST_DAMPING = 1e-13
const MOST_DAMPING = 1e8

/**
 * Damped least squares (Levenberg 1944, Marquardt 1963) from a place t: steps are taken only where they lower the sum of
 * squares. Ends where every residual is at most `met`, or where nothing helps; gives the place and the largest residual.
 */
export function leastSquares(
  residuals: Residuals,
  start: Float64Array,
  met: number,
): { t: Float64Array; worst: number } | undefined {
  let t = start
  let here = residuals(t)
  if (!here) return undefined
  let damping = FIRST_DAMPING
  for (let step = 0; step < STEPS; step++) {
    if (worstOf(here.rest) <= met) break
    const before = squares(here.rest)
    let moved = false
    while (damping <= MOST_DAMPING) {
      const change = dampedStep(here, t.length, damping)
      const next = change && t.map((value, k) => value - (change[k] as number))
      const there = next && residuals(next)
      if (next && there && squares(there.rest) < before) {
        t = next
        here = there
        damping = Math.max(LEAST_DAMPING, damping / 10)
        moved = true
        break
      }
      damping *= 8
    }
    if (!moved) break
  }
  return { t, worst: worstOf(here.rest) }
}

const worstOf = (rest: readonly number[]): number => rest.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
const squares = (rest: readonly number[]): number => rest.reduce((sum, value) => sum + value * value, 0)

/** Solves (J'J + damping D) change = J'rest by Cholesky's method; undefined where rounding spoils it. */
function dampedStep(
  { rest, gradient }: { rest: number[]; gradient: Float64Array[] },
  n: number,
  damping: number,
): Float64Array | undefined {
  const normal = Array.from({ length: n }, () => new Float64Array(n))
  const right = new Float64Array(n)
  gradient.forEach((row, i) => {
    for (let a = 0; a < n; a++) {
      const value = row[a] as number
      if (value === 0) continue
      right[a]! += value * (rest[i] as number)
      const its = normal[a] as Float64Array
      for (let b = 0; b <= a; b++) its[b]! += value * (row[b] as number)
    }
  })
  let largest = 0
  for (let a = 0; a < n; a++) largest = Math.max(largest, normal[a]![a] as number)
  for (let a = 0; a < n; a++) normal[a]![a]! += damping * Math.max(normal[a]![a] as number, 1e-9 * largest) + 1e-300
  for (let a = 0; a < n; a++) {
    const row = normal[a] as Float64Array
    for (let b = 0; b <= a; b++) {
      const other = normal[b] as Float64Array
      let sum = row[b] as number
      for (let k = 0; k < b; k++) sum -= (row[k] as number) * (other[k] as number)
      if (a !== b) row[b] = sum / (other[b] as number)
      else if (sum > 0) row[a] = Math.sqrt(sum)
      else return undefined
    }
  }
  for (let a = 0; a < n; a++) {
    let sum = right[a] as number
    for (let k = 0; k < a; k++) sum -= (normal[a]![k] as number) * (right[k] as number)
    right[a] = sum / (normal[a]![a] as number)
  }
  for (let a = n - 1; a >= 0; a--) {
    let sum = right[a] as number
    for (let k = a + 1; k < n; k++) sum -= (normal[k]![a] as number) * (right[k] as number)
    right[a] = sum / (normal[a]![a] as number)
  }
  return right
}
