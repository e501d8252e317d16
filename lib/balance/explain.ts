import type { Boundary } from './boundaries/boundary'
import { BoundaryCounter, type CountedBoundary } from './boundaries/count-boundary'
import type { Problem } from './problem'
import { settledOf } from './settled-of'
import { type Solution, slotsPerStream } from './solution'
import { sortRows } from './workings/book-rows'
import { connectedSets, EVERY_UP_TO, neighbours, SMALL } from './workings/connected'
import { findWorkings } from './workings/find-workings'
import type { Step } from './workings/step'

export type Explanation = {
  /** Single units, the whole process, and every boundary of a step; in order of size. */
  boundaries: CountedBoundary[]
  workings: Step[]
  /** Number of the step that found the cell, 0 for givens and unknowns; by slot as `Solution.states`. */
  stepOfSlot: Int32Array
}

export type ExplainOptions = {
  /** Every connected boundary up to 10 units; beyond, those of 1 to 4 units and the whole. */
  allBoundaries?: boolean
}

/**
 * Why the cells of a solution have their values, in an order that can be worked by hand, and the count of boundaries.
 * Apart from `solve`, so that it never delays states; `solution` must be that of this very problem. Never throws for what
 * a person typed. Steps: one or more for everything solvable, none for what the solver gave up.
 */
export function explain(problem: Problem, solution: Solution, options: ExplainOptions = {}): Explanation {
  const settled = solution.status === 'gaveUp' ? undefined : settledOf(problem, solution)
  if (!settled) {
    const stepOfSlot = new Int32Array(solution.nStreams * slotsPerStream(solution.nComponents))
    return { boundaries: [], workings: [], stepOfSlot }
  }
  const { model } = settled
  const book = sortRows(model, settled.settled)
  const { steps, units, stepOfSlot } = findWorkings(model, settled.settled, solution, book)
  const whole = model.plant.map((_, u) => u)
  const sets = [
    ...whole.map((u) => [u]),
    ...(whole.length > 0 ? [whole] : []),
    ...units.filter((its) => its.length > 0),
  ]
  if (options.allBoundaries) {
    const next = neighbours(book.units.map(({ streams }) => streams))
    const largest = whole.length <= EVERY_UP_TO ? whole.length : SMALL
    for (let size = 2; size <= largest; size++)
      sets.push(
        ...connectedSets(
          next,
          whole.map(() => true),
          size,
        ),
      )
  }
  const distinct = [...new Map(sets.map((its) => [its.join(), its])).values()]
  const counter = new BoundaryCounter(model, settled.settled, book)
  const boundaries = distinct.sort((a, b) => a.length - b.length).map((its) => counter.count(its))
  return { boundaries, workings: steps, stepOfSlot }
}

/** The boundary round any units (by id), for choosing them by hand; undefined where one is not in the book. */
export function countBoundary(
  problem: Problem,
  solution: Solution,
  units: readonly string[],
): CountedBoundary | undefined {
  const settled = solution.status === 'gaveUp' ? undefined : settledOf(problem, solution)
  const indexes = units.map((id) => settled?.model.unitIndex.get(id))
  if (!settled || indexes.length === 0 || indexes.includes(undefined)) return undefined
  const { model } = settled
  return new BoundaryCounter(model, settled.settled, sortRows(model, settled.settled)).count(indexes as number[])
}

/** A boundary as results print it. */
export const plainBoundary = ({ overlaps: _, ...boundary }: CountedBoundary): Boundary => boundary
