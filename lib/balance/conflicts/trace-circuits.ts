import type { Model } from '../model'
import type { Assembly } from '../rows/assemble'
import type { Member } from '../rows/members'
import type { Resolved } from '../states/resolved'
import { CANCELS, type Circuit, Tracer } from './circuit'
import { reduceCircuits } from './circuit-space'
import { dependentRowsNear } from './near-rows'

/** Above this many row entries times dependent rows only the rows that do not hold are traced. */
const MOST_TRACING = 4e8

/** Weights are off by this many times what open rows miss, but never by more than `MOST_OFF`. */
const OFF_BY = 30
const MOST_OFF = 1e-3

/**
 * All reduced circuits near the rows that do not hold, scaled so that the half-widths together reach 1. A member whose
 * weights cancel to the part `cancels` of themselves takes no part.
 */
export function traceCircuits(
  model: Model,
  assembly: Assembly,
  resolved: Resolved,
  open: number[],
  cancels?: number,
): Circuit[] {
  const tracer = new Tracer(model, assembly, resolved)
  const near = dependentRowsNear(resolved, open)
  const affordable = near.length * resolved.knowledge.elimination.rows.column.length <= MOST_TRACING
  const circuits = (affordable ? near : open)
    .map((row) => tracer.ofDependent(row))
    .filter(({ weight }) => weight.size > 0)
  return reduceCircuits(circuits, cancels).map(normalise)
}

/** Weights are taken at a point that the open rows miss, so that they are off by about as much: such a rest is nothing. */
export function cancelsAt({ knowledge }: Resolved, open: readonly number[]): number {
  const { rows } = knowledge.elimination
  const { value } = knowledge.generic
  let most = 0
  for (const i of open) {
    let rest = rows.rhs[i] as number
    let terms = Math.abs(rest)
    for (let k = rows.start[i] as number; k < (rows.start[i + 1] as number); k++) {
      const term = (rows.value[k] as number) * (value[rows.column[k] as number] as number)
      rest -= term
      terms += Math.abs(term)
    }
    if (terms > 0) most = Math.max(most, Math.abs(rest) / terms)
  }
  return Math.min(MOST_OFF, Math.max(CANCELS, OFF_BY * most))
}

function normalise(circuit: Circuit): Circuit {
  let sum = 0
  for (const reach of circuit.reach.values()) sum += Math.abs(reach)
  if (sum === 0) return circuit
  const scaled = (map: Map<Member, number>): Map<Member, number> =>
    new Map([...map].map(([member, value]) => [member, value / sum]))
  return {
    gap: circuit.gap / sum,
    terms: circuit.terms / sum,
    weight: scaled(circuit.weight),
    reach: scaled(circuit.reach),
    structure: circuit.structure,
  }
}
