import type { Model } from '../model'
import { type Assembly, assemble } from '../rows/assemble'
import type { FractionClash } from '../rows/givens'
import type { Member } from '../rows/members'
import type { Resolved } from '../states/resolved'
import { type Circuit, tension } from './circuit'
import { membersAtOdds, membersOf, minimalSets } from './circuit-space'
import { findCompromise, JUST } from './compromise'
import { shrinkSets } from './shrink'

/** A minimal set of givens and rules that cannot all hold, before it is worded. */
export type ConflictSet = { code: 'fractionSum' | 'balance' | 'forcedZero'; circuit: Circuit; stream?: number }

/** The book without what is at odds: what its states are read from. */
export type Settled = {
  assembly: Assembly
  resolved: Resolved
  sets: ConflictSet[]
  truncated: boolean
  atOdds: Set<Member>
  /** Values that agree by rounding, as the rows take them. */
  adjusted: Map<Member, number>
}

const MOST_PASSES = 24

/**
 * Solves a model, finds what cannot hold together, and solves again without it. Values that differ by no more than their
 * half-widths are replaced by their compromise and are not at odds. The outcome does not depend on the order of typing.
 */
export function settle(model: Model): Settled {
  const atOdds = new Set<Member>()
  const sets: ConflictSet[] = []
  let truncated = false
  for (const clash of assemble(model).clashes) {
    sets.push(fractionSet(clash))
    for (const { index } of clash.members) atOdds.add(index)
  }
  for (let pass = 0; ; pass++) {
    const { assembly, resolved, adjusted, clashes, zero } = findCompromise(model, atOdds)
    if ((clashes.length === 0 && !zero) || pass >= MOST_PASSES)
      return { assembly, resolved, sets, truncated, atOdds, adjusted }
    // Ratios that contradict each other come first: flows of 0 would only hide them behind the flows that are typed.
    if (zero) {
      sets.push({ code: 'forcedZero', circuit: zero.circuit, ...at(zero.stream) })
      for (const member of zero.circuit.weight.keys()) atOdds.add(member)
      continue
    }
    const leftOut = new Set(atOdds)
    for (const { circuits, atZero } of clashes) {
      const found = conflictsOf(circuits)
      truncated ||= found.truncated
      const shrunk = shrinkSets(model, found.sets, { leaveOut: new Set([...leftOut, ...found.atOdds]) })
      for (const circuit of shrunk.sets)
        sets.push(atZero ? { code: 'forcedZero', circuit, ...at(atZero.stream) } : { code: 'balance', circuit })
      for (const member of found.atOdds) if (truncated || !shrunk.dropped.has(member)) atOdds.add(member)
    }
  }
}

const at = (stream: number | undefined): { stream?: number } => (stream === undefined ? {} : { stream })

function conflictsOf(group: Circuit[]): { sets: Circuit[]; truncated: boolean; atOdds: Set<Member> } {
  const isOpen = (circuit: Circuit): boolean => tension(circuit) > 1 + JUST
  const { sets, truncated } = minimalSets(group, isOpen)
  if (sets.length > 0) return { sets, truncated, atOdds: membersAtOdds(group, isOpen) }
  // No single circuit is open, but together they are: all of them are one set.
  const together = group.reduce((sum, circuit) => ({
    gap: Math.abs(sum.gap) > Math.abs(circuit.gap) ? sum.gap : circuit.gap,
    terms: Math.max(sum.terms, circuit.terms),
    weight: new Map([...circuit.weight, ...sum.weight]),
    reach: new Map([...circuit.reach, ...sum.reach]),
    structure: new Set([...circuit.structure, ...sum.structure]),
  }))
  return { sets: [together], truncated, atOdds: new Set(membersOf(together)) }
}

/** The sum of all fractions of a stream as a circuit of its own. */
function fractionSet({ stream, members, sum }: FractionClash): ConflictSet {
  return {
    code: 'fractionSum',
    stream,
    circuit: {
      gap: sum - 1,
      terms: sum + 1,
      weight: new Map(members.map(({ index }) => [index, 1])),
      reach: new Map(members.map(({ index, halfWidth }) => [index, halfWidth])),
      structure: new Set(),
    },
  }
}
