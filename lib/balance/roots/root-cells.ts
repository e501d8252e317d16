import { columnForm, type Measure } from '../measure/measure'
import type { Model } from '../model'
import { CellFlag, CellState, type Place, type Solution } from '../solution'
import { forEachCell, quantityOfCell } from '../states/cells'
import type { CellArrays } from '../states/fill-cells'
import { type Knowledge, knownMeasure } from '../states/knowledge'
import { knownInAll, type Roots } from './find-roots'

/** A measure's value where it follows from the linear rows, is the same in every branch, or in every solution found. */
export function knownWithRoots(
  knowledge: Knowledge,
  roots: Roots | undefined,
  measure: Measure,
): { value: number; isLocal: boolean } | undefined {
  const sure = knownMeasure(knowledge, measure) ?? (roots && knownInAll(roots.branches, measure))
  if (sure !== undefined) return { value: sure, isLocal: false }
  const found = roots && knownInAll(roots.solutions, measure)
  return found === undefined ? undefined : { value: found, isLocal: true }
}

/** What is left of a column's value with roots taken in; undefined where it is not known. */
export const columnWithRoots = (knowledge: Knowledge, roots: Roots | undefined, column: number): number | undefined =>
  knownWithRoots(knowledge, roots, { numerator: columnForm(column) })?.value

/** A cell that hangs on a root where two come together is known to half the digits at best. */
const HALF_THE_DIGITS = 1 / Math.sqrt(Number.EPSILON)

/** Flags cells that hang on a root that only touches; gives their amplification. */
export function flagTouching(
  model: Model,
  roots: Roots,
  before: Knowledge,
  cells: CellArrays,
): Solution['amplification'] {
  if (!roots.touches) return []
  const found: Solution['amplification'] = []
  forEachCell(model, ({ slot, measure }) => {
    if (cells.states[slot] !== CellState.solvable || (cells.flags[slot] as number) & CellFlag.amplified) return
    if (knownMeasure(before, measure) !== undefined) return
    cells.flags[slot]! |= CellFlag.amplified
    found.push([slot, HALF_THE_DIGITS])
  })
  return found
}

/** The different values that cells have in several ways of meeting the rules; undefined where there is one way only. */
export function rootValues(model: Model, roots: Roots, { states }: CellArrays): Solution['roots'] {
  const ways = roots.solutions.length > 0 ? roots.solutions : roots.branches
  if (ways.length < 2) return undefined
  const cells: (Place & { values: number[] })[] = []
  forEachCell(model, ({ slot, stream, component, quantity, measure }) => {
    if (states[slot] !== CellState.unknown) return
    const values: number[] = []
    for (const knowledge of ways) {
      const value = knownMeasure(knowledge, measure)
      if (value === undefined) return
      if (!values.some((its) => Math.abs(its - value) <= 1e-9 * Math.max(Math.abs(its), Math.abs(value))))
        values.push(value)
    }
    cells.push({
      stream: model.problem.streams[stream]?.id as string,
      quantity: quantityOfCell(model, quantity),
      ...(component >= 0 && { component: model.problem.components[component]?.id as string }),
      values: values.sort((a, b) => a - b),
    })
  })
  return cells.length > 0 ? { cells } : undefined
}
