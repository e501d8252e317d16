import type { LinearForm } from '../measure/measure'
import type { Model } from '../model'
import { type Assembly, assemble, typedMembers } from '../rows/assemble'
import type { Member } from '../rows/members'
import { CLOSES, openRows } from '../states/open-rows'
import { resolve } from '../states/resolve'
import type { Resolved } from '../states/resolved'
import { type Agreement, agree } from './agreement'
import { type Circuit, ROUNDING, tension } from './circuit'
import { type ForcedZero, findForcedZero } from './forced-zero'
import { secondOpinion } from './second-opinion'
import { cancelsAt, traceCircuits } from './trace-circuits'

/** Above 1 by less than this, half-widths still just reach. */
export const JUST = 1e-6
/** Steps towards the compromise; each squares the error, so that more only serve values far from each other. */
const MOST_STEPS = 12
/** Values this many half-widths apart are not taken further: no change of the weights would let them agree. */
const HOPELESS = 1e3
/** A verdict that changes by less than this part of what it is above 1 will not change. */
const SETTLED = 0.01
/** Once values are moved, rows have to close to this part of their terms, so that rank is judged at the compromise. */
const FINE = 1e-13

/** Circuits that share members and do not agree, as they stand with the values typed. */
export type Clash = { circuits: Circuit[]; atZero?: { stream: number | undefined } }

/** The rows with the values that agree by rounding moved to their compromise, and what does not agree. */
export type Compromise = {
  assembly: Assembly
  resolved: Resolved
  adjusted: Map<Member, number>
  clashes: Clash[]
  zero?: ForcedZero
}

/**
 * Moves values that disagree within their half-widths to where all rows hold: least squares in half-widths, by repeated
 * linearisation (Gauss and Newton), with every deviation counted from what was typed. Whether a group agrees is judged
 * at the end of that, since at a bad first point the flows that the half-widths are weighed by may be far off.
 */
export function findCompromise(model: Model, leaveOut: ReadonlySet<Member>): Compromise {
  const found = stepwiseCompromise(model, leaveOut)
  if (found.clashes.length === 0 && !found.zero) return found
  // Steps from circuit to circuit can go astray where rounding hides what depends on what: all at once decides.
  const adjusted = secondOpinion(model, leaveOut, found.resolved.knowledge.generic.value)
  if (!adjusted) return found
  const assembly = assemble(model, { leaveOut, adjusted })
  const resolved = resolve(model, assembly)
  if (openRows(resolved.knowledge).length > 0) return found
  if (findForcedZero(model, assembly, resolved, { leaveOut, adjusted, basis: [] })) return found
  return { assembly, resolved, adjusted, clashes: [] }
}

function stepwiseCompromise(model: Model, leaveOut: ReadonlySet<Member>): Compromise {
  const adjusted = new Map<Member, number>()
  const basis: ForcedZero[] = []
  let doubtful: Doubtful[] = []
  for (let step = 0; ; step++) {
    const options = { leaveOut, adjusted, basis: basis.map(({ form }) => form) }
    const assembly = assemble(model, options)
    const resolved = resolve(model, assembly)
    const done: Compromise = { assembly, resolved, adjusted, clashes: [] }
    const zero = findForcedZero(model, assembly, resolved, options)
    if (zero && (step >= MOST_STEPS || basis.some(({ form }) => isSame(form, zero.form)))) return { ...done, zero }
    if (zero) {
      // Rounded ratios leave only a flow of 0 where the true ones leave any flow: held at 1, they show their gap.
      basis.push(zero)
      continue
    }
    const moved = adjusted.size > 0
    const open = openRows(resolved.knowledge, moved ? FINE : CLOSES)
    const typed = typedMembers(model, assembly)
    const trace = (cancels?: number): Circuit[][] =>
      open.length === 0 ? [] : groupsOf(traceCircuits(model, assembly, resolved, open, cancels))
    const now: Doubtful[] = []
    let changed = false
    for (const group of trace(cancelsAt(resolved, open))) {
      if (!group.some((circuit) => tension(circuit) > (moved ? 0 : JUST))) continue
      const circuits = group.map((circuit) => withoutMoves(circuit, typed))
      const verdict = agree(circuits)
      const before = doubtful.find((other) => overlaps(other.circuits, circuits))
      const isSettled =
        before && step > 7 && Math.abs(before.tension - verdict.tension) < SETTLED * (verdict.tension - 1)
      if (step < MOST_STEPS && verdict.tension <= HOPELESS && !isSettled)
        changed = move(verdict, typed, adjusted) || changed
      if (verdict.tension > 1 + JUST) now.push({ circuits, tension: verdict.tension })
    }
    doubtful = [
      ...doubtful.filter((old) => !now.some((its) => overlaps(its.circuits, old.circuits)) && !changed),
      ...now,
    ]
    if (changed && !now.some((its) => its.tension > HOPELESS)) continue
    // Where all rows hold with values within their half-widths, they agree, whatever an earlier step made of it.
    doubtful = doubtful.filter((its) => now.includes(its) || its.circuits.some((circuit) => isBeyond(circuit, typed)))
    const at = basis[0] && { atZero: { stream: basis[0].stream } }
    if (doubtful.length > 0) {
      // Values far apart are told by what they truly rest on, however little that is.
      const strict = doubtful.some((its) => its.tension > HOPELESS)
        ? trace().filter((group) => doubtful.some((its) => overlaps(its.circuits, group)))
        : []
      const clashes = (strict.length > 0 ? strict : doubtful.map(({ circuits }) => circuits)).map((circuits) => ({
        circuits: strict.length > 0 ? circuits.map((circuit) => withoutMoves(circuit, typed)) : circuits,
        ...at,
      }))
      return { ...done, clashes }
    }
    if (basis.length === 0) return done
    const free = assemble(model, { leaveOut, adjusted })
    return { ...done, assembly: free, resolved: resolve(model, free) }
  }
}

/** True where a member was moved by more than its half-width. */
function isBeyond({ weight }: Circuit, typed: ReturnType<typeof typedMembers>): boolean {
  for (const member of weight.keys()) {
    const its = typed.get(member)
    if (its && Math.abs(its.value - its.typed) > its.halfWidth * (1 + JUST)) return true
  }
  return false
}

/** A group that does not agree so far. */
type Doubtful = { circuits: Circuit[]; tension: number }

function overlaps(a: readonly Circuit[], b: readonly Circuit[]): boolean {
  const members = new Set(a.flatMap(({ weight }) => [...weight.keys()]))
  return b.some(({ weight }) => [...weight.keys()].some((member) => members.has(member)))
}

const isSame = (a: LinearForm, b: LinearForm): boolean => a.columns.join() === b.columns.join()

/** The circuit as it stands with what was typed, at the weights of where it stands now. */
export function withoutMoves(circuit: Circuit, typed: ReturnType<typeof typedMembers>): Circuit {
  let { gap } = circuit
  for (const [member, reach] of circuit.reach) {
    const its = typed.get(member)
    if (its && its.halfWidth > 0) gap -= (reach * (its.value - its.typed)) / its.halfWidth
  }
  return { ...circuit, gap }
}

/** Takes a compromise into the values that the rows use; false where nothing is left to change. */
function move({ change }: Agreement, typed: ReturnType<typeof typedMembers>, adjusted: Map<Member, number>): boolean {
  let changed = false
  for (const [member, by] of change) {
    const its = typed.get(member)
    if (!its) continue
    const value = its.typed + by * its.halfWidth
    if (Math.abs(value - its.value) <= ROUNDING * Math.abs(its.value)) continue
    adjusted.set(member, value)
    changed = true
  }
  return changed
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
