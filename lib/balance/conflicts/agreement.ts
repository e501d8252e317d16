import type { Member } from '../rows/members'
import { type Circuit, ROUNDING } from './circuit'

/** How far values must move for all circuits to close, in half-widths, and a compromise that closes them. */
export type Agreement = { tension: number; change: Map<Member, number> }

const SWEEPS = 60

/**
 * Whether the values of a block agree within their half-widths. The least greatest change, in half-widths, is found by
 * reweighted least squares (Lawson's algorithm for the Chebyshev problem, 1961), bounded from both sides so that the
 * verdict is sure; the change itself is the plain least squares one, in half-widths.
 */
export function agree(circuits: readonly Circuit[]): Agreement {
  const members = [...new Set(circuits.flatMap((circuit) => [...circuit.reach.keys()]))].sort((a, b) => a - b)
  // Each gap may also close by its own rounding: two nearly equal circuits would else contradict each other by noise.
  const rows = circuits.map(({ reach, terms }, r) => [
    ...members.map((member) => reach.get(member) ?? 0),
    ...circuits.map((_, other) => (other === r ? ROUNDING * terms : 0)),
  ])
  const gaps = circuits.map(({ gap }) => gap)
  const places = [...members, ...circuits]
  let weights = places.map(() => 1)
  let moves = places.map(() => 0)
  let plain: number[] | undefined
  let above = Number.POSITIVE_INFINITY
  let below = 0
  for (let sweep = 0; sweep < SWEEPS; sweep++) {
    const normal = rows.map((a) =>
      rows.map((b) => a.reduce((sum, value, k) => sum + value * (weights[k] as number) * (b[k] as number), 0)),
    )
    const multipliers = solveDense(normal, gaps)
    if (!multipliers) return { tension: Number.POSITIVE_INFINITY, change: new Map() }
    const pulls = places.map((_, k) =>
      rows.reduce((sum, row, r) => sum + (row[k] as number) * (multipliers[r] as number), 0),
    )
    moves = pulls.map((pull, k) => -pull * (weights[k] as number))
    plain ??= moves
    above = Math.min(above, Math.max(...moves.map(Math.abs)))
    const reach = pulls.reduce((sum, pull) => sum + Math.abs(pull), 0)
    const value = gaps.reduce((sum, gap, r) => sum + gap * (multipliers[r] as number), 0)
    below = Math.max(below, reach > 0 ? Math.abs(value) / reach : Number.POSITIVE_INFINITY)
    if (above <= 1 || below > 1 || above - below < 1e-6 * above) break
    const next = weights.map((weight, k) => weight * Math.abs(pulls[k] as number))
    const sum = next.reduce((total, weight) => total + weight, 0)
    weights = next.map((weight) => (weight * places.length) / sum)
  }
  const settled = plain && Math.max(...plain.map(Math.abs)) <= 1 ? plain : moves
  return {
    tension: above <= 1 ? above : Math.max(below, Math.min(above, 1 + 1e-9)),
    change: new Map(members.map((member, k) => [member, settled[k] as number])),
  }
}

/** Solves a small symmetric system by elimination with complete pivoting; undefined where it contradicts itself. */
function solveDense(matrix: number[][], rhs: number[]): number[] | undefined {
  const n = rhs.length
  const rows = matrix.map((row, i) => [...row, rhs[i] as number])
  const pivots: [number, number][] = []
  const free = new Set(rows.keys())
  for (let step = 0; step < n; step++) {
    let best: [number, number] | undefined
    let size = 0
    for (const i of free)
      for (let j = 0; j < n; j++)
        if (!pivots.some(([, taken]) => taken === j) && Math.abs((rows[i] as number[])[j] as number) > size) {
          size = Math.abs((rows[i] as number[])[j] as number)
          best = [i, j]
        }
    if (!best || size < 1e-300) break
    const [i, j] = best
    free.delete(i)
    pivots.push(best)
    const pivot = rows[i] as number[]
    rows.forEach((row, r) => {
      if (r === i) return
      const factor = (row[j] as number) / (pivot[j] as number)
      for (let k = 0; k <= n; k++) row[k]! -= factor * (pivot[k] as number)
      row[j] = 0
    })
  }
  for (const i of free) if (Math.abs((rows[i] as number[])[n] as number) > 1e-300) return undefined
  const x = new Array<number>(n).fill(0)
  for (const [i, j] of pivots) x[j] = ((rows[i] as number[])[n] as number) / ((rows[i] as number[])[j] as number)
  return x
}
