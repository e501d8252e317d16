import type { Model } from '../model'
import { type Assembly, assemble } from '../rows/assemble'
import type { FractionClash } from '../rows/givens'
import { type AssemblyOptions, type Member, memberOfRule } from '../rows/members'
import { openRows } from '../states/open-rows'
import { resolve } from '../states/resolve'
import type { Resolved } from '../states/resolved'
import { agree } from './agreement'
import { type Circuit, tension } from './circuit'
import { membersAtOdds, membersOf, minimalSets } from './circuit-space'
import { findForcedZero } from './forced-zero'
import { shrinkSets } from './shrink'
import { traceCircuits } from './trace-circuits'

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

/** Above 1 by less than this, half-widths still just reach. */
const JUST = 1e-6
const MOST_PASSES = 24

/**
 * Solves a model, finds what cannot hold together, and solves again without it. Values that differ by no more than their
 * half-widths are replaced by their compromise and are not at odds. The outcome does not depend on the order of typing.
 */
export function settle(model: Model): Settled {
  const atOdds = new Set<Member>()
  const adjusted = new Map<Member, number>()
  const sets: ConflictSet[] = []
  let truncated = false
  for (let pass = 0; ; pass++) {
    const options: AssemblyOptions = { leaveOut: atOdds, adjusted }
    const assembly = assemble(model, options)
    if (pass === 0)
      for (const clash of assembly.clashes) {
        sets.push(fractionSet(clash))
        for (const { index } of clash.members) atOdds.add(index)
      }
    const resolved = resolve(model, assembly)
    const done = { assembly, resolved, sets, truncated, atOdds, adjusted }
    if (pass >= MOST_PASSES) return done
    // Ratios that contradict each other come first: flows of 0 would only hide them behind the flows that are typed.
    const zero = findForcedZero(model, assembly, resolved, options)
    if (zero) {
      sets.push({
        code: 'forcedZero',
        circuit: zero.circuit,
        ...(zero.stream !== undefined && { stream: zero.stream }),
      })
      for (const member of zero.circuit.weight.keys()) atOdds.add(member)
      continue
    }
    const open = openRows(resolved.knowledge)
    if (open.length > 0) {
      const circuits = traceCircuits(model, assembly, resolved, open)
      let changed = false
      for (const group of groupsOf(circuits)) {
        if (!group.some((circuit) => tension(circuit) > JUST)) continue
        const verdict = agree(group)
        if (verdict.tension <= 1 + JUST) {
          changed = adjust(model, assembly, verdict.change, adjusted) || changed
          continue
        }
        const found = conflictsOf(group)
        truncated ||= found.truncated
        const all = new Set([...atOdds, ...found.atOdds])
        const shrunk = shrinkSets(model, found.sets, { leaveOut: all, adjusted })
        for (const circuit of shrunk.sets) sets.push({ code: 'balance', circuit })
        for (const member of found.atOdds) if (truncated || !shrunk.dropped.has(member)) atOdds.add(member)
        changed = true
      }
      if (changed) continue
    }
    return done
  }
}

/** Circuits that share members, directly or through others. */
function groupsOf(circuits: Circuit[]): Circuit[][] {
  const groups: { members: Set<Member>; circuits: Circuit[] }[] = []
  for (const circuit of circuits) {
    const joined = { members: new Set(circuit.weight.keys()), circuits: [circuit] }
    for (let g = groups.length - 1; g >= 0; g--) {
      const group = groups[g] as (typeof groups)[number]
      if (![...circuit.weight.keys()].some((member) => group.members.has(member))) continue
      for (const member of group.members) joined.members.add(member)
      joined.circuits.push(...group.circuits)
      groups.splice(g, 1)
    }
    groups.push(joined)
  }
  return groups.map((group) => group.circuits)
}

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

/** Takes a compromise into the values that the rows use; false where nothing is left to change. */
function adjust(model: Model, { rows }: Assembly, change: Map<Member, number>, adjusted: Map<Member, number>): boolean {
  let changed = false
  const typed = new Map<Member, { value: number; halfWidth: number }>()
  rows.source.forEach((number, i) => {
    const source = rows.sources[number]
    const its = rows.typed[i]
    if (its && source?.type === 'given') typed.set(source.index, its)
    else if (its && source?.type === 'rule') typed.set(memberOfRule(model, source.index), its)
  })
  for (const [member, move] of change) {
    const its = typed.get(member)
    if (!its || Math.abs(move) < 1e-9) continue
    adjusted.set(member, its.value + move * its.halfWidth)
    changed = true
  }
  return changed
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
