import type { Knowledge } from './knowledge'

/** A dependent row that closes to this part of the terms it is made of holds. */
export const CLOSES = 1e-9

/** Dependent rows (numbered among the compiled rows) that do not hold, at a generic solution of the others. */
export function openRows(knowledge: Knowledge): number[] {
  const { rows, dependent } = knowledge.elimination
  return dependent.filter((i) => {
    let rest = rows.rhs[i] as number
    let terms = Math.abs(rest)
    for (let k = rows.start[i] as number; k < (rows.start[i + 1] as number); k++) {
      const term = (rows.value[k] as number) * (knowledge.generic[rows.column[k] as number] as number)
      rest -= term
      terms += Math.abs(term)
    }
    return Math.abs(rest) > CLOSES * terms
  })
}
