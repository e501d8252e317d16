import type { BookRows } from './book-rows'
import type { RegionRow } from './region'

/** Scratch over all columns, kept between questions: all 0 (`own`, `count`) or empty (`first`) outside of them. */
export type Scratch = { count: Int32Array; first: Int32Array; fixed: Uint8Array }

export const scratchFor = (nColumns: number): Scratch => ({
  count: new Int32Array(nColumns),
  first: new Int32Array(nColumns).fill(-1),
  fixed: new Uint8Array(nColumns),
})

/**
 * True where the pattern of the rows alone says that nothing new can follow: a row with columns of its own in two
 * streams fixes no cell, since a cell is of one stream. Such rows are taken away until none is left; what a row then
 * holds that stood alone with one stream is looked at backwards. Exact as a refusal, not as an acceptance.
 */
export function givesNothing(book: BookRows, rows: readonly RegionRow[], scratch: Scratch): boolean {
  const { count, first, fixed } = scratch
  const { streamOf, model } = book
  // The total follows from the components and the sums: without it the pattern shows more.
  const isSpare = hasComponents(rows) ? (row: RegionRow) => row.uses[0]?.equation === 'total' : () => false
  const active = new Uint8Array(rows.length)
  // For each column the rows it stands in, as lists linked through `link`.
  const link: number[] = []
  const rowOfLink: number[] = []
  const queue: number[] = []
  rows.forEach((row, i) => {
    if (isSpare(row)) return
    active[i] = 1
    queue.push(i)
    for (const j of row.columns) {
      count[j]!++
      link.push(first[j] as number)
      first[j] = rowOfLink.push(i) - 1
    }
  })
  const groupOf = (j: number): number => {
    const s = streamOf[j] as number
    return s >= 0 ? s : model.nStreams + j
  }
  const tails: { row: RegionRow; own: number[] }[] = []
  for (let q = 0; q < queue.length; q++) {
    const i = queue[q] as number
    if (!active[i]) continue
    const row = rows[i] as RegionRow
    const own = row.columns.filter((j) => count[j] === 1)
    if (own.length === 0) continue
    active[i] = 0
    const group = groupOf(own[0] as number)
    if (own.every((j) => groupOf(j) === group)) tails.push({ row, own })
    for (const j of row.columns) {
      if (--count[j]! !== 1) continue
      for (let at = first[j] as number; at >= 0; at = link[at] as number)
        if (active[rowOfLink[at] as number]) queue.push(rowOfLink[at] as number)
    }
  }
  let nothing = !rows.some((row, i) => active[i] === 1 && row.kind === 'equation')
  for (let t = tails.length - 1; nothing && t >= 0; t--) {
    const { row, own } = tails[t] as (typeof tails)[number]
    if (!row.columns.every((j) => own.includes(j) || fixed[j])) continue
    if (row.kind === 'equation') nothing = false
    else if (own.length === 1) fixed[own[0] as number] = 1
  }
  for (const { columns } of rows)
    for (const j of columns) {
      count[j] = 0
      first[j] = -1
      fixed[j] = 0
    }
  return nothing
}

const hasComponents = (rows: readonly RegionRow[]): boolean => rows.some(({ uses }) => uses[0]?.equation === 'balance')
