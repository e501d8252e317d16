import type { LinearForm } from '../measure/measure'
import type { Model } from '../model'
import { fixedValue, type Knowledge } from './knowledge'

/** A flow that must be 0, and the sum of flows that says so. */
export type ZeroSum = { column: number; sum: LinearForm }

/**
 * Columns of flows that must be 0 because a sum of flows that holds them is 0 in every solution: a stream's total, and
 * what is left over at one side of a unit, in total and for each component. Flows already known are left alone, and so
 * is a sum that a known flow of another value takes part in.
 */
export function zeroSums(model: Model, knowledge: Knowledge): ZeroSum[] {
  const { probes } = knowledge
  if (probes.length === 0) return []
  const sums: ZeroSum[] = []
  const moves = (column: number): boolean => probes.some((h) => h.value[column] !== 0)
  const found = new Set<number>()
  const look = (columns: number[]): void => {
    const open = columns.filter((column) => column >= 0 && moves(column))
    if (
      open.length === 0 ||
      columns.some((column) => column >= 0 && !moves(column) && (knowledge.particular.value[column] as number) < 0)
    )
      return
    const sum = { columns: open, coefficients: open.map(() => 1), constant: 0 }
    if (fixedValue(knowledge, sum) !== 0) return
    for (const column of open) {
      if (!found.has(column)) sums.push({ column, sum })
      found.add(column)
    }
  }
  const flowOf = (s: number, c: number): number => model.flowColumn[s * model.nComponents + c] as number
  for (let s = 0; s < model.nStreams; s++) {
    const total = model.totalColumn[s] as number
    if (total >= 0 && !moves(total)) look((model.present[s] as number[]).map((c) => flowOf(s, c)))
  }
  for (const unit of model.plant)
    for (const side of [unit.inlets, unit.outlets]) {
      if (side.length < 2) continue
      look(side.map((s) => model.totalColumn[s] as number))
      for (let c = 0; c < model.nComponents; c++) look(side.map((s) => flowOf(s, c)))
    }
  return sums
}
