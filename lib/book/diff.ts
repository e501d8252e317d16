import type { Change, FieldUpdate } from './change'
import { type BookRecord, type FieldValue, fieldsOf, kindOrder } from './kinds'
import type { BookState } from './state'

/**
 * What leads from one state to another, as the body of a change: `apply(from, diff(from, to))` equals `to`.
 * Kinds whose map is the same object are passed over, so a diff after one edit costs one kind.
 */
export function diff(from: BookState, to: BookState): Omit<Change, 'id' | 'label'> {
  const create: BookRecord[] = []
  const update: FieldUpdate[] = []
  const remove: BookRecord[] = []
  for (const kind of kindOrder) {
    const before = from[kind] as ReadonlyMap<string, BookRecord>
    const after = to[kind] as ReadonlyMap<string, BookRecord>
    if (before === after) continue
    for (const [id, record] of before) if (!after.has(id)) remove.push(record)
    for (const [id, record] of after) {
      const old = before.get(id)
      if (!old) create.push(record)
      else if (old !== record) {
        const fields = fieldDiff(old, record)
        if (Object.keys(fields).length > 0) update.push({ kind, id, fields })
      }
    }
  }
  return { create, update, remove: remove.reverse() }
}

function fieldDiff(old: BookRecord, record: BookRecord): FieldUpdate['fields'] {
  const fields: FieldUpdate['fields'] = {}
  for (const field of fieldsOf[record.kind]) {
    const from = (old as unknown as Record<string, FieldValue>)[field] ?? null
    const to = (record as unknown as Record<string, FieldValue>)[field] ?? null
    if (from !== to) fields[field] = [from, to]
  }
  return fields
}
