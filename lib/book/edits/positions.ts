import type { FieldUpdate } from '../change'
import { updateOf } from './draft'
import type { Listed } from './tags'

/**
 * Positions for `count` records put after `after` (null: before all) in an ordered list. Where no room is left between
 * two neighbours, the list is numbered afresh and `update` holds that.
 */
export function positionsAfter(
  list: readonly Listed[],
  after: string | null,
  count: number,
): { positions: number[]; update: (FieldUpdate | undefined)[] } {
  const index = after === null ? -1 : list.findIndex(({ id }) => id === after)
  const low = list[index]?.position
  const high = list[index + 1]?.position
  const positions = spread(low, high, count)
  const ordered = [low ?? Number.NEGATIVE_INFINITY, ...positions, high ?? Number.POSITIVE_INFINITY]
  if (ordered.every((position, i) => i === 0 || position > (ordered[i - 1] as number))) return { positions, update: [] }
  return {
    positions: Array.from({ length: count }, (_, i) => index + 2 + i),
    update: list.map((record, i) => updateOf(record, { position: i <= index ? i + 1 : i + 1 + count })),
  }
}

function spread(low: number | undefined, high: number | undefined, count: number): number[] {
  const each = (at: (i: number) => number): number[] => Array.from({ length: count }, (_, i) => at(i))
  if (low === undefined && high === undefined) return each((i) => i + 1)
  if (high === undefined) return each((i) => Math.floor(low as number) + 1 + i)
  if (low === undefined) return each((i) => Math.ceil(high) - count + i)
  return each((i) => low + ((high - low) * (i + 1)) / (count + 1))
}
