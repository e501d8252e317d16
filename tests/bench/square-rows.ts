import type { Elimination } from '@/lib/balance/sparse/elimination'

/** As many independent rows as there are unknowns, as (row, column, value) and right-hand sides. */
export type SquareRows = { n: number; row: number[]; column: number[]; value: number[]; rhs: number[] }

/** The rows that the elimination used, of a fully determined book: one factorisation of them is what others are asked for. */
export function squareRows({ rows, peeled, core, coreRow, singleRow }: Elimination): SquareRows {
  const used = [
    ...peeled.rows.filter((i) => i >= 0),
    ...Array.from(core.pivotRow, (r) => coreRow[r] as number),
    ...singleRow,
  ]
  if (used.length !== rows.nColumns)
    throw new Error(`the book is not fully determined: ${used.length} rows for ${rows.nColumns} unknowns`)
  const square: SquareRows = { n: used.length, row: [], column: [], value: [], rhs: [] }
  used.forEach((i, r) => {
    for (let k = rows.start[i] as number; k < (rows.start[i + 1] as number); k++) {
      square.row.push(r)
      square.column.push(rows.column[k] as number)
      square.value.push(rows.value[k] as number)
    }
    square.rhs.push(rows.rhs[i] as number)
  })
  return square
}
