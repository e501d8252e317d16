import type { Model } from '../model'
import { assemble } from '../rows/assemble'
import type { AssemblyOptions, Member } from '../rows/members'
import { openRows } from '../states/open-rows'
import { resolve } from '../states/resolve'
import { type Circuit, tension } from './circuit'
import { membersOf } from './circuit-space'
import { traceCircuits } from './trace-circuits'

/** Columns times solutions that may be spent on shrinking; beyond, sets stand as the linear rows give them. */
const MOST_WORK = 12_000

/**
 * A set that is minimal among linear rows may hold a member that equal compositions make needless (the split of a
 * splitter whose composition is typed). Each member is left out in turn, and stays out where the rest still cannot hold.
 */
export function shrinkSets(
  model: Model,
  sets: readonly Circuit[],
  options: AssemblyOptions & { leaveOut: ReadonlySet<Member> },
): { sets: Circuit[]; dropped: Set<Member> } {
  const hasCompositions =
    model.plant.some(({ kind }) => kind === 'splitter') ||
    model.problem.relations?.some(({ kind }) => kind === 'sameComposition')
  if (!hasCompositions) return { sets: [...sets], dropped: new Set() }
  let work = 0
  const shrunk = new Map<string, Circuit>()
  for (const circuit of sets) {
    let current = circuit
    for (const member of membersOf(circuit)) {
      work += model.nColumns
      if (work > MOST_WORK) break
      if (!current.weight.has(member)) continue
      const rest = membersOf(current).filter((other) => other !== member)
      current = clashOf(model, rest, options) ?? current
    }
    shrunk.set(membersOf(current).join(','), current)
  }
  const kept = new Set([...shrunk.values()].flatMap(membersOf))
  const dropped = new Set(sets.flatMap(membersOf).filter((member) => !kept.has(member)))
  return { sets: [...shrunk.values()], dropped }
}

/** The circuit in which some of `members` cannot hold, all else at odds left out; undefined where they can. */
function clashOf(
  model: Model,
  members: readonly Member[],
  options: AssemblyOptions & { leaveOut: ReadonlySet<Member> },
): Circuit | undefined {
  const leaveOut = new Set(options.leaveOut)
  for (const member of members) leaveOut.delete(member)
  const assembly = assemble(model, { ...options, leaveOut })
  const resolved = resolve(model, assembly)
  const open = openRows(resolved.knowledge)
  if (open.length === 0) return undefined
  const allowed = new Set(members)
  return traceCircuits(model, assembly, resolved, open).find(
    (circuit) => tension(circuit) > 1 + 1e-6 && membersOf(circuit).every((member) => allowed.has(member)),
  )
}
