import type { BookRecord, Kind } from '../kinds'
import { type BookState, inOrder } from '../state'

/** Kinds whose records have a tag and a place in an order. */
export type Listed = Extract<BookRecord, { tag: string; position: number }>
export type ListedKind = Listed['kind']

const firstTags: Record<ListedKind, string> = {
  stream: '101',
  component: 'Component 1',
  unit: 'U-101',
  reaction: 'R1',
  parameter: 'k1',
  rule: 'Q1',
}

export const listedIn = (state: BookState, kind: ListedKind): Listed[] =>
  inOrder(state[kind] as ReadonlyMap<string, Listed>)

export const takenTags = (state: BookState, kind: Kind): Set<string> =>
  new Set([...(state[kind] as ReadonlyMap<string, { tag?: string }>).values()].map(({ tag }) => tag?.trim() ?? ''))

/** The next free tag of a series: 113 after 112, T-102 after T-101, Feed 2 after Feed. */
export function nextTag(taken: ReadonlySet<string>, kind: ListedKind, after: string | undefined): string {
  if (after === undefined) return taken.has(firstTags[kind]) ? nextTag(taken, kind, firstTags[kind]) : firstTags[kind]
  const [, stem = '', digits] = /^(.*?)(\d+)[A-Z]?$/.exec(after.trim()) ?? [undefined, `${after.trim()} `, '1']
  const width = digits?.length ?? 1
  for (let number = BigInt(digits ?? '1') + 1n; ; number++) {
    const tag = `${stem}${String(number).padStart(width, '0')}`
    if (tag.length > 40) return nextTag(taken, kind, undefined)
    if (!taken.has(tag)) return tag
  }
}

/** A tag between two that stand: 105A, 105B, …; the next of the series once the letters are used up. */
export function tagBetween(taken: ReadonlySet<string>, kind: ListedKind, before: string): string {
  const stem = before.trim().replace(/(\d)[A-Z]$/, '$1')
  if (/\d$/.test(stem) && stem.length < 40)
    for (let code = 65; code <= 90; code++) {
      const tag = `${stem}${String.fromCharCode(code)}`
      if (!taken.has(tag)) return tag
    }
  return nextTag(taken, kind, before)
}
