import { leavesOf } from '../formula/parse-formula'
import type { Model } from '../model'
import type { Pending } from '../pending/pending'
import type { Assembly } from '../rows/assemble'

/**
 * Streams of each connected block in which no row holds a flow at a value other than 0, so that all its flows are known
 * up to a common factor at best. Blocks are joined by rows and by rules still to turn into rows.
 */
export function freeScaleBlocks(model: Model, assembly: Assembly, isZero: (stream: number) => boolean): string[][] {
  const { rows } = assembly
  const find = blocksOf(model, assembly)
  const scaled = new Set<number>()
  for (let i = 0; i < rows.count; i++)
    if (rows.rhs[i] !== 0 && (rows.start[i] as number) < (rows.start[i + 1] as number))
      scaled.add(find(rows.column[rows.start[i] as number] as number))
  const blocks = new Map<number, string[]>()
  model.problem.streams.forEach(({ id }, s) => {
    const column = model.totalColumn[s] as number
    if (column < 0 || isZero(s)) return
    const block = find(column)
    if (!scaled.has(block)) blocks.set(block, [...(blocks.get(block) ?? []), id])
  })
  return [...blocks.values()]
}

/** The block of each column, named by one of its columns: what is joined by rows and by rules still to turn into rows. */
export function blocksOf(model: Model, { rows, pending }: Assembly): (column: number) => number {
  const parent = Int32Array.from({ length: model.nColumns }, (_, j) => j)
  const find = (j: number): number => {
    let root = j
    while (parent[root] !== root) root = parent[root] as number
    for (let at = j; at !== root; ) {
      const next = parent[at] as number
      parent[at] = root
      at = next
    }
    return root
  }
  const join = (columns: readonly number[]): void => {
    for (const column of columns) parent[find(column)] = find(columns[0] as number)
  }
  for (let i = 0; i < rows.count; i++) join(rows.column.slice(rows.start[i], rows.start[i + 1]))
  for (const item of pending) join(columnsOfPending(model, item))
  return find
}

/** Columns that a rule still to turn into rows speaks of; -1 among them for a stream with nothing in it. */
export function columnsOfPending(model: Model, item: Pending): number[] {
  if (item.kind === 'composition') return item.composition.streams.map((s) => model.totalColumn[s] as number)
  if (item.kind === 'scaled')
    return [...item.measure.numerator.columns, ...(item.measure.denominator?.columns ?? []), item.parameter]
  return [...leavesOf(item.left), ...leavesOf(item.right)].flatMap((leaf) => {
    if (leaf.kind === 'parameter') {
      const column = model.parameterColumn[model.parameterIndex.get(leaf.id) as number] as number
      return column < 0 ? [] : [column]
    }
    return [model.totalColumn[model.streamIndex.get(leaf.stream) as number] as number].filter((column) => column >= 0)
  })
}
