import type { Member } from '../rows/members'
import { smallRank } from '../sparse/small-rank'
import { type Circuit, combineCircuits } from './circuit'

/** At most this many sets are listed. */
export const MOST_SETS = 20

/**
 * The circuits in reduced form: each has a member of its own (its head) that no other has, so that the heads' complement
 * is a basis and each circuit a fundamental one of the matroid of members. Circuits of structure alone drop out, and so
 * does a member whose weights cancel to the part `cancels` of themselves.
 */
export function reduceCircuits(circuits: readonly Circuit[], cancels?: number): Circuit[] {
  const reduced: { head: Member; circuit: Circuit }[] = []
  for (const start of circuits) {
    let circuit = start
    for (const { head, circuit: other } of reduced) {
      const weight = circuit.weight.get(head)
      if (weight !== undefined && weight !== 0)
        circuit = combineCircuits(1, circuit, -weight / (other.weight.get(head) as number), other, cancels)
    }
    let head: Member | undefined
    for (const [member, weight] of circuit.weight)
      if (weight !== 0 && (head === undefined || Math.abs(weight) > Math.abs(circuit.weight.get(head) as number)))
        head = member
    if (head === undefined) continue
    const pivot = circuit.weight.get(head) as number
    for (const entry of reduced) {
      const weight = entry.circuit.weight.get(head)
      if (weight !== undefined && weight !== 0)
        entry.circuit = combineCircuits(1, entry.circuit, -weight / pivot, circuit, cancels)
    }
    reduced.push({ head, circuit })
  }
  return reduced.map(({ circuit }) => circuit)
}

export const membersOf = (circuit: Circuit): Member[] => [...circuit.weight.keys()].sort((a, b) => a - b)

/**
 * Every member of some minimal set that cannot hold: two elements of a matroid share a circuit exactly where the graph
 * of fundamental circuits joins them, so it is all that is joined to a circuit that does not close.
 */
export function membersAtOdds(circuits: readonly Circuit[], isOpen: (circuit: Circuit) => boolean): Set<Member> {
  const atOdds = new Set<Member>()
  const waiting = new Set(circuits)
  for (const circuit of circuits)
    if (isOpen(circuit)) {
      waiting.delete(circuit)
      for (const member of circuit.weight.keys()) atOdds.add(member)
    }
  for (let grew = true; grew; ) {
    grew = false
    for (const circuit of waiting) {
      if (![...circuit.weight.keys()].some((member) => atOdds.has(member))) continue
      for (const member of circuit.weight.keys()) atOdds.add(member)
      waiting.delete(circuit)
      grew = true
    }
  }
  return atOdds
}

/** At most this many joins are tried, so that the search ends soon in a book with many readings. */
const MOST_JOINS = 400

/** Minimal sets that cannot hold, smallest first, at most `MOST_SETS`: the open circuits and what comes of joining two. */
export function minimalSets(
  circuits: readonly Circuit[],
  isOpen: (circuit: Circuit) => boolean,
): { sets: Circuit[]; truncated: boolean } {
  const key = (circuit: Circuit): string => membersOf(circuit).join(',')
  const seen = new Set(circuits.map(key))
  const open = circuits.filter(isOpen)
  let joins = 0
  let truncated = open.length > MOST_SETS
  for (let q = 0; q < open.length && !truncated; q++)
    for (const joined of joinsOf(open[q] as Circuit, circuits)) {
      if (++joins > MOST_JOINS || open.length >= MOST_SETS) {
        truncated = true
        break
      }
      const its = key(joined)
      if (seen.has(its)) continue
      seen.add(its)
      if (isOpen(joined) && isElementary(joined, circuits)) open.push(joined)
    }
  const keyed = open.map((circuit) => ({ circuit, its: key(circuit) }))
  keyed.sort((a, b) => a.circuit.weight.size - b.circuit.weight.size || (a.its < b.its ? -1 : 1))
  return { sets: keyed.slice(0, MOST_SETS).map(({ circuit }) => circuit), truncated }
}

/** The circuit with each of the reduced ones, so that one member that both have drops out. */
function* joinsOf(circuit: Circuit, circuits: readonly Circuit[]): Generator<Circuit> {
  for (const other of circuits) {
    if (other === circuit) continue
    for (const [member, weight] of circuit.weight) {
      const its = other.weight.get(member)
      if (its === undefined) continue
      const joined = combineCircuits(1, circuit, -weight / its, other)
      if (joined.weight.size > 0) yield joined
    }
  }
}

/** True where no other circuit lives on a part of its members: the reduced circuits, held to 0 outside, leave one direction. */
function isElementary(circuit: Circuit, basis: readonly Circuit[]): boolean {
  const outside = basis.map((other) => [...other.weight].filter(([member]) => !circuit.weight.has(member)))
  const columns = [...new Set(outside.flatMap((entries) => entries.map(([member]) => member)))]
  const rows = columns.map((column) =>
    outside.map((entries) => entries.find(([member]) => member === column)?.[1] ?? 0),
  )
  return basis.length - denseRank(rows) <= 1
}

function denseRank(rows: number[][]): number {
  const scaled = rows.map((row) => {
    const size = Math.max(...row.map(Math.abs))
    return row.map((value) => value / size)
  })
  return smallRank(scaled, 1e-9)
}
