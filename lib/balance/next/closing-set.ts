import { settle } from '../conflicts/find-conflicts'
import { buildModel } from '../model'
import type { Problem } from '../problem'
import type { KeptCell } from '../states/cells'
import { knownMeasure } from '../states/knowledge'
import { givenAt, type MeasureNext, measurableFirst, placeOf, withGivens } from './places'
import { classesOf, freshProbes, type Signature, signaturesOf, withMeasured } from './signatures'
import { type StandIn, surveyOpen, type Terrain } from './terrain'

type Allowed = (signature: Signature) => boolean

/** Cells times probes times picks: beyond, no closing set is sought. */
const MOST_WORK = 4e8
const MOST_FURTHER = 6
export const FIRST_SEED = 7_103

/**
 * One small set of values that closes the table, or settles all that the allowed ones can: the value that settles most
 * cells, then the one that settles most of the rest, and so on. Never claimed before a solve with values of a random
 * solution has closed as much. No member is redundant.
 */
export function closingSet(
  problem: Problem,
  terrain: Terrain,
  at: StandIn,
  elsewhere: StandIn | undefined,
  allowed: Allowed,
): MeasureNext | undefined {
  const nProbes = at.knowledge.elimination.free.length + 3
  if (terrain.open.length * nProbes * nProbes > MOST_WORK) return undefined
  let left = signaturesOf(terrain.open, at.point, freshProbes(at.knowledge, nProbes))
  let picks: Signature[] = []
  const used = new Set<number>()
  while (left.length > 0) {
    const coordinates: number[] = []
    for (let q = 0; q < nProbes && coordinates.length < 3; q++) if (!used.has(q)) coordinates.push(q)
    const pick = bestOf(classesOf(left, coordinates as [number, number, number]), allowed)
    if (!pick) break
    const taken = withMeasured(left, pick)
    used.add(taken.pivot)
    left = taken.left
    picks.push(pick)
  }
  const isLinear = terrain.settled.resolved.left.length === 0
  const first = picks.length
  const byRoots = isLinear ? undefined : settledByRoots(problem, terrain, at, picks, elsewhere)
  let open = leftOpen(problem, terrain, picks)
  if (byRoots !== undefined && byRoots > terrain.open.length - (open?.length ?? terrain.open.length))
    return setOf(terrain, picks, byRoots)
  for (let more = 0; !isLinear && open && open.length > 0 && more < MOST_FURTHER; more++) {
    // What moves no more to first order and is still open waits for a rule to turn linear.
    const slots = new Set(open.map(({ slot }) => slot))
    const further = signaturesOf(open, at.point, freshProbes(terrain.settled.resolved.knowledge, 3)).filter(
      (its) => slots.has(its.cell.slot) && allowed(its) && !picks.some(({ cell }) => cell.slot === its.cell.slot),
    )
    const [next] = measurableFirst(further)
    if (!next) break
    picks = [...picks, next]
    open = leftOpen(problem, terrain, picks)
  }
  if (!open || picks.length === 0) return undefined
  const nOpen = open.length
  for (const pick of picks.length > first ? [...picks] : []) {
    const without = picks.filter((other) => other !== pick)
    if (leftOpen(problem, terrain, without)?.length === nOpen) picks = without
  }
  return setOf(terrain, picks, terrain.open.length - nOpen)
}

const setOf = ({ model, unknown }: Terrain, picks: readonly Signature[], settles: number): MeasureNext => ({
  set: picks.map(({ cell }) => placeOf(model, cell)),
  settles,
  leaves: unknown - settles,
})

/**
 * What a full solve settles with these values, where rules may have to be solved for their roots: the lesser of what it
 * settles at two solutions of all rules, since the number of roots hangs on the values. undefined where there are not two.
 */
export function settledByRoots(
  problem: Problem,
  terrain: Terrain,
  at: StandIn,
  picks: readonly Signature[],
  elsewhere: StandIn | undefined,
): number | undefined {
  if (!at.isSolution || !elsewhere?.isSolution || picks.length === 0) return undefined
  const unknown = [at, elsewhere].map(({ point }) => {
    const cells = picks.map(({ cell }) => cell)
    const there = signaturesOf(cells, point, freshProbes(terrain.settled.resolved.knowledge, 3))
    if (there.length < picks.length) return undefined
    const after = surveyOpen(
      withGivens(
        problem,
        there.map((pick) => givenAt(terrain.model, pick)),
      ),
    )
    return after && after.settled.sets.length <= terrain.settled.sets.length ? after.unknown : undefined
  })
  const [here, there] = unknown
  return here === undefined || there === undefined ? undefined : terrain.unknown - Math.max(here, there)
}

/** The largest class with a flow or a fraction in it; a component's flow, which no instrument reads, only where none is left. */
function bestOf(classes: Signature[][], allowed: Allowed): Signature | undefined {
  let spare: Signature | undefined
  for (const its of classes) {
    const [first] = measurableFirst(its.filter(allowed))
    if (first && first.cell.quantity !== 'componentFlow') return first
    spare ??= first
  }
  return spare
}

/**
 * The open cells that are left once these are typed, as the rows and what turns linear give them: what is found in one of
 * several ways of meeting a rule hangs on the value and is not counted. undefined where typing them brings a clash.
 */
export function leftOpen(problem: Problem, terrain: Terrain, picks: readonly Signature[]): KeptCell[] | undefined {
  const model = buildModel(
    withGivens(
      problem,
      picks.map((pick) => givenAt(terrain.model, pick)),
    ),
  )
  if (!model) return undefined
  const { sets, resolved } = settle(model)
  if (sets.length > terrain.settled.sets.length) return undefined
  // The columns are the same: givens of the book's own basis add none.
  return terrain.open.filter(({ measure }) => knownMeasure(resolved.knowledge, measure) === undefined)
}
