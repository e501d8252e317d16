import { z } from 'zod'
import { type BookRecord, type FieldValue, type Kind, kindOrder, recordSchema } from './kinds'
import type { BookState } from './state'

/**
 * One named edit of a book, as a diff of fields. The same for typing, paste, undo, import, restore and what others did.
 * `remove` carries the whole records, so that every change can be inverted; it lists all that goes with a removal.
 */
export type FieldUpdate = { kind: Kind; id: string; fields: Record<string, [from: FieldValue, to: FieldValue]> }
export type Change = {
  /** Made by the writer; the same id again is answered with the first result. */
  id: string
  /** What was done, for the undo menu and the history: "Total flow of 101: 50 000". */
  label: string
  create: BookRecord[]
  update: FieldUpdate[]
  remove: BookRecord[]
}

const fieldValue = z.union([z.string(), z.number(), z.null()])
export const changeSchema = z.strictObject({
  id: z.string().min(8).max(64),
  label: z.string().min(1).max(300),
  create: z.array(recordSchema).max(200_000),
  update: z
    .array(
      z.strictObject({
        kind: z.enum(kindOrder as [Kind, ...Kind[]]),
        id: z.string().min(1).max(160),
        fields: z.record(z.string(), z.tuple([fieldValue, fieldValue])),
      }),
    )
    .max(200_000),
  remove: z.array(recordSchema).max(200_000),
})

/** Why a change cannot be applied to a state as it stands. */
export type ChangeConflict =
  | { code: 'gone'; kind: Kind; id: string }
  | { code: 'exists'; kind: Kind; id: string; theirs: BookRecord; mine: BookRecord }
  | {
      code: 'field'
      kind: Kind
      id: string
      field: string
      from: FieldValue
      theirs: FieldValue
      mine: FieldValue | undefined
    }

export type Applied = { ok: true; state: BookState } | { ok: false; conflicts: ChangeConflict[] }

const fieldOf = (record: BookRecord, field: string): FieldValue | undefined =>
  (record as unknown as Record<string, FieldValue | undefined>)[field]

/**
 * The state after a change, or every reason why not. A creation wants its place free, an update wants each touched field
 * to equal its `from`, a removal wants the record as it was. Whole or not at all; the given state is left as it is.
 */
export function apply(state: BookState, change: Change): Applied {
  const conflicts: ChangeConflict[] = []
  const touched = new Map<Kind, Map<string, BookRecord>>()
  const mapFor = (kind: Kind): Map<string, BookRecord> => {
    let map = touched.get(kind)
    if (!map) {
      map = new Map<string, BookRecord>(state[kind])
      touched.set(kind, map)
    }
    return map
  }
  for (const record of change.remove) {
    const map = mapFor(record.kind)
    const current = map.get(record.id)
    if (!current) {
      conflicts.push({ code: 'gone', kind: record.kind, id: record.id })
      continue
    }
    for (const field of Object.keys(record)) {
      const from = fieldOf(record, field) ?? null
      const theirs = fieldOf(current, field) ?? null
      if (from !== theirs)
        conflicts.push({ code: 'field', kind: record.kind, id: record.id, field, from, theirs, mine: undefined })
    }
    map.delete(record.id)
  }
  for (const { kind, id, fields } of change.update) {
    const map = mapFor(kind)
    const current = map.get(id)
    if (!current) {
      conflicts.push({ code: 'gone', kind, id })
      continue
    }
    const next: Record<string, unknown> = { ...current }
    for (const [field, [from, to]] of Object.entries(fields)) {
      const theirs = fieldOf(current, field) ?? null
      if (theirs !== from) conflicts.push({ code: 'field', kind, id, field, from, theirs, mine: to })
      next[field] = to
    }
    map.set(id, next as BookRecord)
  }
  for (const record of change.create) {
    const map = mapFor(record.kind)
    const theirs = map.get(record.id)
    if (theirs) conflicts.push({ code: 'exists', kind: record.kind, id: record.id, theirs, mine: record })
    map.set(record.id, record)
  }
  if (conflicts.length > 0) return { ok: false, conflicts }
  return { ok: true, state: { ...state, ...Object.fromEntries(touched) } as BookState }
}

/** The change that takes another back. `invert(invert(c))` does what `c` does. */
export function invert(change: Change, id: string, label = change.label): Change {
  return {
    id,
    label,
    create: [...change.remove].reverse(),
    remove: [...change.create].reverse(),
    update: [...change.update].reverse().map(({ kind, id, fields }) => ({
      kind,
      id,
      fields: Object.fromEntries(
        Object.entries(fields).map(([f, [from, to]]) => [f, [to, from] as [FieldValue, FieldValue]]),
      ),
    })),
  }
}

export const isEmptyChange = (change: Change): boolean =>
  change.create.length + change.update.length + change.remove.length === 0
