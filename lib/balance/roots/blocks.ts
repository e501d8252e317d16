import type { Model } from '../model'
import type { Pending } from '../pending/pending'
import { equationsOf } from './equations'
import type { FreeSpace } from './free-space'

/** Rules that are joined by what they leave free, and the directions (by number) that they are about. */
export type Block = { items: Pending[]; directions: number[] }

/** Takes rules apart where no free direction joins them: each block can be met by itself. */
export function blocksOf(model: Model, { point, directions }: FreeSpace, items: readonly Pending[]): Block[] {
  const blocks: { items: Pending[]; directions: Set<number> }[] = []
  for (const item of items) {
    const columns = new Set(equationsOf(model, item, point).flatMap(({ gradient }) => gradient.columns))
    for (const column of columnsOf(model, item)) columns.add(column)
    const joined = { items: [item], directions: new Set<number>() }
    directions.forEach((h, q) => {
      for (const column of columns) if (h[column] !== 0) joined.directions.add(q)
    })
    for (let k = blocks.length - 1; k >= 0; k--) {
      const other = blocks[k] as (typeof blocks)[number]
      if (![...other.directions].some((q) => joined.directions.has(q))) continue
      for (const q of other.directions) joined.directions.add(q)
      joined.items.push(...other.items)
      blocks.splice(k, 1)
    }
    blocks.push(joined)
  }
  return blocks.map((block) => ({ items: block.items, directions: [...block.directions].sort((a, b) => a - b) }))
}

/** A gradient misses columns whose factor is 0 at the point; a second point far from it shows them. */
function columnsOf(model: Model, item: Pending): number[] {
  const point = Float64Array.from({ length: model.nColumns }, (_, j) => 1 + ((j * 37) % 11) / 7)
  return equationsOf(model, item, point).flatMap(({ gradient }) => gradient.columns)
}
