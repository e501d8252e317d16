import type { Resolved } from '../states/resolved'

/** Dependent rows that are joined to one of `seeds` through rows and columns. */
export function dependentRowsNear({ knowledge }: Resolved, seeds: readonly number[]): number[] {
  const { rows, dependent } = knowledge.elimination
  const seen = new Uint8Array(rows.nRows)
  const stack = [...seeds]
  for (const i of stack) seen[i] = 1
  for (let i = stack.pop(); i !== undefined; i = stack.pop())
    for (let k = rows.start[i] as number; k < (rows.start[i + 1] as number); k++) {
      const j = rows.column[k] as number
      for (let q = rows.columnStart[j] as number; q < (rows.columnStart[j + 1] as number); q++) {
        const next = rows.rowOfEntry[q] as number
        if (seen[next]) continue
        seen[next] = 1
        stack.push(next)
      }
    }
  return dependent.filter((i) => seen[i])
}
