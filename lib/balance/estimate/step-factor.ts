import type { Equation, Sloped } from './exact-equations'
import { type ExactSpace, movedBy } from './exact-space'
import { measureAt, type Reading } from './readings'

/** Readings and equations made linear at a point. */
export type Linearised = {
  residual: Float64Array
  /** Gradient of each measure over its sigma, length n each. */
  gradients: Float64Array[]
  equations: Sloped[]
  slopes: Float64Array[]
}

/**
 * The largest of 1, 1/2, 1/4 … that makes the sum of squares with a price on what the equations miss smaller, and
 * empties no stream that is read. The price is high enough that the whole step pays (Han, J. Optim. Theory Appl. 22, 1977).
 */
export function stepFactor(
  space: ExactSpace,
  readings: readonly Reading[],
  equations: readonly Equation[],
  x: Float64Array,
  step: Float64Array,
  { residual, gradients, equations: sloped }: Linearised,
  totals: readonly number[],
  bounded: readonly number[],
): { factor: number; gain: number } {
  const squares = (at: Float64Array): number => {
    let sum = 0
    for (const { measure, value, sigma } of readings) sum += ((value - measureAt(measure, at)) / sigma) ** 2
    return sum
  }
  // What an equation misses is held against its terms at the point that the step starts from.
  const size = usualSize(x)
  const missed = (at: Float64Array): number => {
    let sum = 0
    equations.forEach((equation, k) => {
      sum += Math.abs(equation(at).value) / ((sloped[k] as Sloped).size || 1)
    })
    for (const j of bounded) sum += Math.max(-(at[j] as number), 0) / size
    return sum
  }
  const keepsFlow = (at: Float64Array): boolean =>
    totals.every((j) => (x[j] as number) <= 0 || (at[j] as number) > 0.05 * (x[j] as number))
  const now = squares(x)
  const open = missed(x)
  const promised = residual.reduce((sum, r, i) => sum + (r - dot(gradients[i] as Float64Array, step)) ** 2, 0)
  const price = open > 0 ? (2 * Math.max(promised - now, 0)) / open + now + 1 : 0
  const gain = now - promised + price * open
  const relative = (now - promised) / (now + 1) + open
  for (let factor = 1; factor > 1e-7; factor /= 2) {
    const at = movedBy(space, x, step, factor)
    if (!keepsFlow(at)) continue
    const after = squares(at) + price * missed(at)
    if (after <= now + price * open - 1e-4 * factor * gain + 1e-12 * (now + 1)) return { factor, gain: relative }
  }
  return { factor: 1e-7, gain: relative }
}

export function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0
  for (let k = 0; k < a.length; k++) sum += (a[k] as number) * (b[k] as number)
  return sum
}

/** Geometric mean of the flows that are not 0. */
export function usualSize(x: Float64Array): number {
  let sum = 0
  let count = 0
  for (const value of x)
    if (value !== 0 && Number.isFinite(value)) {
      sum += Math.log(Math.abs(value))
      count++
    }
  return count === 0 ? 1 : Math.exp(sum / count)
}
