import type { Problem } from '../problem'
import { Work } from '../roots/work'
import { closingSet, FIRST_SEED, leftOpen, settledByRoots } from './closing-set'
import { type Cannot, isAllowed, type MeasureNext, measurableFirst, placeOf } from './places'
import { classesOf, freshProbes, type Signature, signaturesOf } from './signatures'
import { type StandIn, standIn, surveyOpen, type Terrain } from './terrain'

export type MeasureNextOptions = {
  /** What cannot be measured: single places, the flow or the analysis of a stream, a component anywhere. */
  cannot?: Cannot
  /** At most so many single candidates; left out: 40. */
  most?: number
}

const MOST_CANDIDATES = 40
/** Entries of rows that may be solved over again to see what candidates settle where rules wait to turn linear. */
const MOST_TRYING = 100_000
const STAND_INS = 4e8
/** The largest classes, for which roots are sought too. */
const MOST_ROOTS = 3

/**
 * What to measure next: single values and one small closing set, best first, so that the first closes the table if
 * anything does (`leaves` 0). Counts are of cells of the summary. Measures with parallel gradients at one random solution
 * become known together; where rules wait to turn linear, each candidate is solved with the value it has there, and what would
 * only be found as a root counts where it is found at two solutions. Nothing is claimed in blocks at odds.
 */
export function measureNext(problem: Problem, options: MeasureNextOptions = {}): MeasureNext[] {
  const terrain = surveyOpen(problem)
  if (!terrain || terrain.open.length === 0) return []
  const isLinear = terrain.settled.resolved.left.length === 0
  const work = new Work(STAND_INS)
  const at = standIn(terrain, FIRST_SEED, work)
  const elsewhere = isLinear ? undefined : standIn(terrain, FIRST_SEED + 1, work)
  if (at.knowledge.probes.length === 0) return []
  const allowed = isAllowed(terrain.model, options.cannot)
  const classes = classesOf(signaturesOf(terrain.open, at.point, freshProbes(at.knowledge, 3)), [0, 1, 2])
  const settled = isLinear ? classes.map((its) => its.length) : bySolving(problem, terrain, classes, at, elsewhere)
  const singles: MeasureNext[] = []
  for (const [k, its] of classes.entries()) {
    const settles = settled[k]
    if (settles === undefined) continue
    for (const { cell } of measurableFirst(its.filter(allowed)))
      singles.push({ set: [placeOf(terrain.model, cell)], settles, leaves: terrain.unknown - settles })
  }
  singles.sort((a, b) => b.settles - a.settles)
  const found = singles.slice(0, options.most ?? MOST_CANDIDATES)
  const closing = closingSet(problem, terrain, at, elsewhere, allowed)
  if (closing && closing.set.length > 1) found.push(closing)
  return found.sort((a, b) => a.leaves - b.leaves || a.set.length - b.set.length)
}

/** What each class settles, by solving the book with one of its values; undefined beyond the work allowed. */
function bySolving(
  problem: Problem,
  terrain: Terrain,
  classes: Signature[][],
  at: StandIn,
  elsewhere: StandIn | undefined,
): (number | undefined)[] {
  let work = 0
  return classes.map(([first], k) => {
    work += terrain.settled.assembly.rows.column.length
    if (!first || work > MOST_TRYING) return undefined
    const open = leftOpen(problem, terrain, [first])
    const byRows = open && terrain.open.length - open.length
    if (k >= MOST_ROOTS) return byRows
    return Math.max(byRows ?? 0, settledByRoots(problem, terrain, at, [first], elsewhere) ?? 0) || undefined
  })
}
