import { type Circuit, combineCircuits, Tracer } from '../conflicts/circuit'
import { reduceCircuits } from '../conflicts/circuit-space'
import { withoutMoves } from '../conflicts/compromise'
import type { Settled } from '../conflicts/find-conflicts'
import { dependentRowsNear } from '../conflicts/near-rows'
import type { Model } from '../model'
import type { Given } from '../problem'
import { typedMembers } from '../rows/assemble'
import { type GivenInUse, givensInUse } from '../rows/givens'
import type { Member } from '../rows/members'
import type { Check } from '../solution'
import { placeKey, placeOf } from './places'

/** A difference below this part of the terms needs no mention. */
const CLOSES = 1e-9

/**
 * One entry for each redundancy that agrees within half-widths but does not close by itself, in a form that does not
 * depend on the order of typing. A stream's fractions that are all typed are a `sum`.
 */
export function redundantChecks(model: Model, settled: Settled): Check[] {
  const { assembly, resolved, adjusted, atOdds } = settled
  const sums = sumChecks(model, atOdds)
  if (adjusted.size === 0) return sums.map(({ check }) => check)
  const inSums = new Set(sums.map(({ members }) => [...members].sort((a, b) => a - b).join()))
  const e = resolved.knowledge.elimination
  const seeds = e.rows.stored.reduce<number[]>((list, row, i) => {
    const source = assembly.rows.sources[assembly.rows.source[row] as number]
    const member =
      source?.type === 'given'
        ? source.index
        : source?.type === 'rule'
          ? (model.problem.givens?.length ?? 0) + source.index
          : -1
    if (adjusted.has(member)) list.push(i)
    return list
  }, [])
  const tracer = new Tracer(model, assembly, resolved)
  const typed = typedMembers(model, assembly)
  const circuits = dependentRowsNear(resolved, seeds)
    .map((row) => tracer.ofDependent(row))
    .filter(({ weight }) => weight.size > 0)
  const order = [...new Set(circuits.flatMap(({ weight }) => [...weight.keys()]))].sort((a, b) =>
    keyOf(model, a) < keyOf(model, b) ? -1 : 1,
  )
  const checks = inOrder(reduceCircuits(circuits), order).flatMap(({ circuit, head }): Check[] => {
    const asTyped = withoutMoves(circuit, typed)
    const members = order.filter((member) => circuit.weight.has(member))
    if (Math.abs(asTyped.gap) <= CLOSES * circuit.terms) return []
    if (inSums.has([...members].sort((a, b) => a - b).join())) return []
    const own = circuit.weight.get(head) as number
    let reach = 0
    for (const value of circuit.reach.values()) reach += Math.abs(value)
    const by = asTyped.gap / own
    const tolerance = reach / Math.abs(own)
    return [{ code: 'redundant', ...placesOf(model, members), by, tolerance, agrees: Math.abs(by) <= tolerance }]
  })
  return [...sums.map(({ check }) => check), ...checks]
}

/** Circuits so combined that each has a head, the first possible in the order, that no other has. */
function inOrder(circuits: readonly Circuit[], order: readonly Member[]): { circuit: Circuit; head: Member }[] {
  const rest = [...circuits]
  const done: { circuit: Circuit; head: Member }[] = []
  for (const head of order) {
    const at = rest.findIndex(({ weight }) => weight.has(head))
    if (at < 0) continue
    const [circuit] = rest.splice(at, 1) as [Circuit]
    const clear = (other: Circuit): Circuit => {
      const factor = other.weight.get(head)
      return factor === undefined
        ? other
        : combineCircuits(1, other, -factor / (circuit.weight.get(head) as number), circuit)
    }
    rest.forEach((other, k) => {
      rest[k] = clear(other)
    })
    for (const entry of done) entry.circuit = clear(entry.circuit)
    done.push({ circuit, head })
  }
  return done
}

/** All fractions of a stream typed on one basis, whose sum is off by more than rounding and less than half-widths. */
function sumChecks(model: Model, atOdds: ReadonlySet<Member>): { members: Member[]; check: Check }[] {
  const groups = new Map<string, GivenInUse[]>()
  for (const entry of givensInUse(model).givens) {
    const { quantity, stream, instrument = 'main', without } = entry.given
    if (without || instrument !== 'main' || atOdds.has(entry.index)) continue
    if (quantity !== 'massFraction' && quantity !== 'moleFraction') continue
    const key = `${stream}\u0000${quantity}`
    groups.set(key, [...(groups.get(key) ?? []), entry])
  }
  return [...groups.values()].flatMap((entries) => {
    const [{ stream }] = entries as [GivenInUse]
    if (entries.length !== model.present[stream]?.length) return []
    const choice = model.problem.streams[stream]?.fractions ?? 'asTyped'
    const by = entries.reduce((sum, { typed }) => sum + typed, 0) - 1
    if (choice !== 'asTyped' || Math.abs(by) <= CLOSES) return []
    const tolerance = entries.reduce((sum, { halfWidth }) => sum + halfWidth, 0)
    const members = entries.map(({ index }) => index)
    const agrees = Math.abs(by) <= tolerance * (1 + CLOSES)
    return [{ members, check: { code: 'sum', ...placesOf(model, members), by, tolerance, agrees } }]
  })
}

function placesOf(model: Model, members: readonly Member[]): Pick<Check, 'givens' | 'relations'> {
  const nGivens = model.problem.givens?.length ?? 0
  const sorted = [...members].sort((a, b) => (keyOf(model, a) < keyOf(model, b) ? -1 : 1))
  return {
    givens: sorted.filter((member) => member < nGivens).map((member) => placeOf(givenAt(model, member))),
    relations: sorted
      .filter((member) => member >= nGivens)
      .map((member) => model.problem.relations?.[member - nGivens]?.id as string),
  }
}

const givenAt = (model: Model, member: Member): Given => (model.problem.givens as Given[])[member] as Given

/** Givens before rules, each by what it is called. */
function keyOf(model: Model, member: Member): string {
  const nGivens = model.problem.givens?.length ?? 0
  if (member >= nGivens) return `1${model.problem.relations?.[member - nGivens]?.id}`
  return `0${placeKey(placeOf(givenAt(model, member)))}`
}
