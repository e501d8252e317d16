import { MOVES, type Vector } from '../sparse/solve'
import type { KeptCell } from '../states/cells'
import { addProbe, evaluate, type Knowledge } from '../states/knowledge'

/** How an unknown cell moves along each probe, at one solution; `error` bounds what in it is rounding. */
export type Signature = { cell: KeptCell; value: number; moves: Float64Array; error: Float64Array }

const ZERO_DENOMINATOR = 1e-9
const ROUNDING = 2e-16
/** Two ratios further apart than this part of themselves are different, however blurred. */
const APART = 1e-6
const SAME = 1e-11

/** Probes other than the first, which the generic solution holds: along it a ratio of flows known to a factor stands still. */
export function freshProbes(knowledge: Knowledge, count: number): Vector[] {
  while (knowledge.probes.length <= count) addProbe(knowledge)
  return knowledge.probes.slice(1, count + 1)
}

/** Cells that move, with their values at the solution. A ratio to a flow of 0 has none and is left out. */
export function signaturesOf(cells: readonly KeptCell[], point: Vector, probes: readonly Vector[]): Signature[] {
  const found: Signature[] = []
  for (const cell of cells) {
    const { numerator, denominator } = cell.measure
    const top = evaluate(numerator, point)
    const bottom = denominator && evaluate(denominator, point)
    if (bottom && Math.abs(bottom.value) <= ZERO_DENOMINATOR * bottom.terms) continue
    const value = bottom ? top.value / bottom.value : top.value
    const moves = new Float64Array(probes.length)
    const error = new Float64Array(probes.length)
    let still = true
    for (const [q, probe] of probes.entries()) {
      const up = evaluate(numerator, probe, true)
      const down = denominator && evaluate(denominator, probe, true)
      const move = up.value - (down ? value * down.value : 0)
      const terms = up.terms + (down ? Math.abs(value) * down.terms : 0)
      error[q] = MOVES * terms
      if (Math.abs(move) <= (error[q] as number)) continue
      moves[q] = move
      still = false
    }
    if (!still) found.push({ cell, value, moves, error })
  }
  return found
}

/**
 * Cells whose signatures are parallel become known together. Three coordinates tell: they are random, so that two
 * different directions agree in them by chance only. Largest class first, else in the order of the cells.
 */
export function classesOf(
  signatures: readonly Signature[],
  coordinates: readonly [number, number, number],
): Signature[][] {
  const [a, b, c] = coordinates
  const ratio = ({ moves, error }: Signature, k: number): { at: number; blur: number } => {
    const at = (moves[k] as number) / (moves[a] as number)
    const part = (q: number): number => (error[q] as number) / Math.abs(moves[q] as number) || 0
    return { at, blur: Math.abs(at) * Math.min(APART, SAME + part(a) + part(k)) }
  }
  const keyed = signatures.map((signature, order) => ({
    signature,
    order,
    second: ratio(signature, b),
    third: ratio(signature, c),
  }))
  keyed.sort((left, right) => left.second.at - right.second.at || left.order - right.order)
  const classes: (typeof keyed)[] = []
  for (const entry of keyed) {
    const current = classes.at(-1)
    const last = current?.at(-1)
    if (current && last && isSame(last.second, entry.second) && isSame(last.third, entry.third)) current.push(entry)
    else classes.push([entry])
  }
  for (const its of classes) its.sort((left, right) => left.order - right.order)
  classes.sort((left, right) => right.length - left.length || (left[0]?.order as number) - (right[0]?.order as number))
  return classes.map((its) => its.map(({ signature }) => signature))
}

function isSame(left: { at: number; blur: number }, right: { at: number; blur: number }): boolean {
  if (!Number.isFinite(left.at) || !Number.isFinite(right.at)) return false
  return Math.abs(left.at - right.at) <= left.blur + right.blur
}

/** Takes one cell as measured: what moved with it moves no more. Gives the signatures that are left. */
export function withMeasured(
  signatures: readonly Signature[],
  measured: Signature,
): { left: Signature[]; pivot: number } {
  let pivot = 0
  measured.moves.forEach((value, q) => {
    if (Math.abs(value) > Math.abs(measured.moves[pivot] as number)) pivot = q
  })
  const head = measured.moves[pivot] as number
  const left: Signature[] = []
  for (const signature of signatures) {
    const factor = (signature.moves[pivot] as number) / head
    const moves = new Float64Array(signature.moves.length)
    const error = new Float64Array(signature.moves.length)
    let still = true
    for (let q = 0; q < moves.length; q++) {
      if (q === pivot) continue
      const off = factor * (measured.moves[q] as number)
      const move = (signature.moves[q] as number) - off
      error[q] =
        (signature.error[q] as number) + Math.abs(factor) * (measured.error[q] as number) + ROUNDING * Math.abs(off)
      if (Math.abs(move) <= (error[q] as number)) continue
      moves[q] = move
      still = false
    }
    if (!still && signature !== measured) left.push({ ...signature, moves, error })
  }
  return { left, pivot }
}
