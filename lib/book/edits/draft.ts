import type { Result } from '@/lib/errors'
import { apply, type Change, type FieldUpdate } from '../change'
import { check } from '../check'
import { diff } from '../diff'
import { type BookRecord, type FieldValue, kindOrder } from '../kinds'
import type { BookState } from '../state'

/** What every edit gives back: the change to apply, or a sentence that says why not and what to do. */
export type Edit = Result<Change, string>
export type MakeId = () => string

type Body = { create?: BookRecord[]; update?: (FieldUpdate | undefined)[]; remove?: BookRecord[] }

export const refuse = (error: string): { ok: false; error: string } => ({ ok: false, error })

/** The change, once it is known to apply and to leave a sound book. `makeId` gives the change its id. */
export function edit(state: BookState, makeId: MakeId, label: string, body: Body): Edit {
  const change: Change = {
    id: makeId(),
    label: label.length > 300 ? `${label.slice(0, 299)}…` : label,
    create: body.create ?? [],
    update: (body.update ?? []).filter((update) => update !== undefined),
    remove: (body.remove ?? []).toSorted((a, b) => kindOrder.indexOf(b.kind) - kindOrder.indexOf(a.kind)),
  }
  const applied = apply(state, change)
  if (!applied.ok) throw new Error(`An edit does not apply to the state it was made for: ${label}`)
  const [problem, ...more] = check(applied.state, change)
  if (problem) return refuse(more.length > 0 ? `${problem.what} (and ${more.length} more)` : problem.what)
  return { ok: true, value: change }
}

/** The update that gives a record these fields; undefined when it has them already. */
export function updateOf<R extends BookRecord>(
  record: R,
  fields: Partial<Omit<R, 'kind' | 'id'>>,
): FieldUpdate | undefined {
  const diffs: FieldUpdate['fields'] = {}
  for (const [field, to] of Object.entries(fields) as [string, FieldValue | undefined][]) {
    const from = (record as unknown as Record<string, FieldValue>)[field] ?? null
    if (to !== undefined && from !== to) diffs[field] = [from, to]
  }
  return Object.keys(diffs).length > 0 ? { kind: record.kind, id: record.id, fields: diffs } : undefined
}

/** Several edits, each made for the state that the one before leaves, as one change: one step of undo. */
export function together(
  state: BookState,
  makeId: MakeId,
  label: string,
  steps: readonly ((state: BookState) => Edit)[],
): Edit {
  let current = state
  for (const step of steps) {
    const made = step(current)
    if (!made.ok) return made
    const applied = apply(current, made.value)
    if (!applied.ok) throw new Error(`A step of an edit does not apply: ${made.value.label}`)
    current = applied.state
  }
  return edit(state, makeId, label, diff(state, current))
}

/** "1 stream", "3 streams". */
export const counted = (count: number, one: string, many = `${one}s`): string => `${count} ${count === 1 ? one : many}`

/** "101", "101 and 102", "101, 102 and 3 more". */
export function listed(words: readonly string[], atMost = 3): string {
  if (words.length <= 1) return words[0] ?? ''
  const shown = words.length > atMost ? words.slice(0, atMost - 1) : words.slice(0, -1)
  const last = words.length > atMost ? `${words.length - shown.length} more` : words[words.length - 1]
  return `${shown.join(', ')} and ${last}`
}
