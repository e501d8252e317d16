import type { GridPlace } from '@/hooks/grid-model'
import type { SolvedCase } from '@/hooks/solver-handle'
import type { CountedBoundary, Explanation } from '@/lib/balance'
import { buildModel, type Model } from '@/lib/balance/model'
import type { MeasureName, Problem } from '@/lib/balance/problem'
import { formatNumber } from '@/lib/sheet/format'
import { type BookView, isFraction, rowOfPlace, rowScale, rowStyle, rowUnit } from '../book-view'
import { type RowPlace, rowIdOf } from '../rows'

/** Why the cells of one answer have their values: the problem as it was solved, its answer and the workings. */
export type Explained = { problem: Problem; solved: SolvedCase; explanation: Explanation }

/** A boundary as the panes mark it, by tags. */
export type MarkedBoundary = Pick<CountedBoundary, 'units' | 'crossing'>

const models = new WeakMap<Problem, Model | null>()

/** The problem's plant by indexes; null where its flow unit does not fit. Made once for each problem. */
export function modelOf(problem: Problem): Model | null {
  const before = models.get(problem)
  if (before !== undefined) return before
  const model = buildModel(problem) ?? null
  models.set(problem, model)
  return model
}

export const sameBoundary = (a: MarkedBoundary | null, b: MarkedBoundary): boolean =>
  a !== null && a.units.join('\n') === b.units.join('\n')

/** A value of the solver as the row prints it, without its unit. */
export function shownAt(view: BookView, row: RowPlace, value: number, extraDigits = 0): string {
  const digits = isFraction(row.quantity) || row.quantity === 'measure' ? view.digits.fraction : view.digits.flow
  return formatNumber(value * rowScale(view, row), rowStyle(view, row), { decimal: view.decimal, digits, extraDigits })
}

/** The cell of the stream table that the solver names by tags; null where the book no longer has it. */
export function placeOf(view: BookView, name: MeasureName & { stream: string }): GridPlace | null {
  const row = rowOfPlace(view, name)
  const stream = view.streams.find(({ tag }) => tag.trim() === name.stream)
  return row && stream ? { row: rowIdOf(row), column: stream.id } : null
}

export const unitOf = (view: BookView, row: RowPlace): string => rowUnit(view, row).shown
