import type { Member } from '../rows/members'
import { type Circuit, ROUNDING } from './circuit'
import { leastTension } from './least-tension'

/** How far values must move for all circuits to close, in half-widths, and a compromise that closes them. */
export type Agreement = { tension: number; change: Map<Member, number> }

/** A circuit of which the others leave this part is one of them, give or take rounding. */
const REPEATS = 1e-13

/**
 * Whether the values of a block agree within their half-widths. Where the least squares moves (in half-widths) are
 * within them all, they do; else the least greatest move decides. The compromise is the least squares one where it can be.
 */
export function agree(circuits: readonly Circuit[]): Agreement {
  const members = [...new Set(circuits.flatMap((circuit) => [...circuit.reach.keys()]))].sort((a, b) => a - b)
  // Each gap may also close by its own rounding: two nearly equal circuits would else contradict each other by noise.
  const rows = circuits.map(({ reach, terms }, r) => [
    ...members.map((member) => reach.get(member) ?? 0),
    ...circuits.map((_, other) => (other === r ? ROUNDING * terms : 0)),
  ])
  const gaps = circuits.map(({ gap }) => gap)
  const changeOf = (moves: number[]): Map<Member, number> =>
    new Map(members.map((member, k) => [member, moves[k] as number]))
  const plain = leastSquares(rows, gaps)
  const most = plain.reduce((size, move) => Math.max(size, Math.abs(move)), 0)
  if (most <= 1) return { tension: most, change: changeOf(plain) }
  const least = leastTension(rows, gaps)
  if (!least) return { tension: most, change: changeOf(plain) }
  return { tension: least.tension, change: changeOf(least.tension <= 1 ? least.moves : plain) }
}

/** The smallest moves that close all rows, by orthogonal rows (Gram and Schmidt, twice over). */
function leastSquares(rows: readonly number[][], gaps: readonly number[]): number[] {
  const n = rows[0]?.length ?? 0
  const basis: Float64Array[] = []
  const moves = new Float64Array(n)
  rows.forEach((row, r) => {
    const left = Float64Array.from(row)
    for (let pass = 0; pass < 2; pass++)
      for (const other of basis) {
        const along = dot(left, other)
        for (let k = 0; k < n; k++) left[k]! -= along * (other[k] as number)
      }
    const length = Math.sqrt(dot(left, left))
    if (length <= REPEATS * Math.sqrt(dot(row, row))) return
    for (let k = 0; k < n; k++) left[k]! /= length
    basis.push(left)
    const missing = -(gaps[r] as number) - dot(row, moves)
    const step = missing / dot(row, left)
    for (let k = 0; k < n; k++) moves[k]! += step * (left[k] as number)
  })
  return Array.from(moves)
}

function dot(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let sum = 0
  for (let k = 0; k < a.length; k++) sum += (a[k] as number) * (b[k] as number)
  return sum
}
