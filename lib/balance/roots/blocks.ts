import type { Model } from '../model'
import type { Pending } from '../pending/pending'
import { type Expression, equationsOf, formsOf } from './equations'
import type { FreeSpace } from './free-space'

/** Rules that are joined by what they leave free, their equations, and the directions (by number) that they are about. */
export type Block = { items: Pending[]; equations: { source: number; equation: Expression }[]; directions: number[] }

/** Takes rules apart where no free direction joins them: each block can be met by itself. */
export function blocksOf(model: Model, { directions }: FreeSpace, items: readonly Pending[]): Block[] {
  const blocks: (Block & { set: Set<number> })[] = []
  for (const item of items) {
    const equations = equationsOf(model, item).map((equation) => ({ source: item.source, equation }))
    const columns = new Set(equations.flatMap(({ equation }) => formsOf(equation).flatMap((form) => form.columns)))
    const joined = { items: [item], equations, directions: [], set: new Set<number>() }
    directions.forEach((h, q) => {
      for (const column of columns) if (h[column] !== 0) joined.set.add(q)
    })
    for (let k = blocks.length - 1; k >= 0; k--) {
      const other = blocks[k] as (typeof blocks)[number]
      if (![...other.set].some((q) => joined.set.has(q))) continue
      for (const q of other.set) joined.set.add(q)
      joined.items.push(...other.items)
      joined.equations.push(...other.equations)
      blocks.splice(k, 1)
    }
    blocks.push(joined)
  }
  return blocks.map(({ items: its, equations, set }) => ({
    items: its,
    equations,
    directions: [...set].sort((a, b) => a - b),
  }))
}
