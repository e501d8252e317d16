import { LOST } from './form-values'
import type { Knowledge } from './knowledge'

/** A dependent row that closes to this part of the terms it is made of holds. */
export const CLOSES = 1e-9

/** Dependent rows (numbered among the compiled rows) that do not hold, at a generic solution of the others. */
export function openRows(knowledge: Knowledge, closes = CLOSES): number[] {
  const { rows, dependent } = knowledge.elimination
  const { value, size } = knowledge.generic
  return dependent.filter((i) => {
    let rest = rows.rhs[i] as number
    let terms = Math.abs(rest)
    let made = 0
    for (let k = rows.start[i] as number; k < (rows.start[i + 1] as number); k++) {
      const a = rows.value[k] as number
      const j = rows.column[k] as number
      const term = a * (value[j] as number)
      rest -= term
      terms += Math.abs(term)
      made = Math.max(made, Math.abs(a) * (size[j] as number))
    }
    return Math.abs(rest) > closes * Math.max(terms, LOST * made)
  })
}
