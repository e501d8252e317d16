import type { Model } from '../model'
import type { Assembly } from '../rows/assemble'
import type { Member } from '../rows/members'
import type { Resolved } from '../states/resolved'
import { type Circuit, Tracer } from './circuit'
import { reduceCircuits } from './circuit-space'
import { dependentRowsNear } from './near-rows'

/** Above this many row entries times dependent rows only the rows that do not hold are traced. */
const MOST_TRACING = 4e8

/** All reduced circuits near the rows that do not hold, scaled so that the half-widths together reach 1. */
export function traceCircuits(model: Model, assembly: Assembly, resolved: Resolved, open: number[]): Circuit[] {
  const tracer = new Tracer(model, assembly, resolved)
  const near = dependentRowsNear(resolved, open)
  const affordable = near.length * resolved.knowledge.elimination.rows.column.length <= MOST_TRACING
  const circuits = (affordable ? near : open)
    .map((row) => tracer.ofDependent(row))
    .filter(({ weight }) => weight.size > 0)
  return reduceCircuits(circuits).map(normalise)
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
