import { apply, type Change, type FieldUpdate } from './change'
import { type BookRecord, type FieldValue, fieldsOf } from './kinds'
import type { BookState } from './state'

/**
 * "Keep mine": the same intent as a refused change, written against what stands now. A creation whose place was filled
 * meanwhile becomes an update of it; an update or removal starts from the values that stand; what is gone already is left
 * out of a removal. Undefined when it cannot be kept, because a record that it edits is gone.
 */
export function rebase(change: Change, state: BookState, id: string): Change | undefined {
  const create: BookRecord[] = []
  const update: FieldUpdate[] = []
  const remove: BookRecord[] = []
  for (const record of change.remove) {
    const current = state[record.kind].get(record.id)
    if (current) remove.push(current)
  }
  const removed = new Set(remove.map((record) => `${record.kind}:${record.id}`))
  for (const { kind, id: recordId, fields } of change.update) {
    const current = state[kind].get(recordId)
    if (!current) return undefined
    update.push({ kind, id: recordId, fields: onto(current, (field) => fields[field]?.[1], Object.keys(fields)) })
  }
  for (const record of change.create) {
    const current = state[record.kind].get(record.id)
    if (!current || removed.has(`${record.kind}:${record.id}`)) create.push(record)
    else {
      const mine = record as unknown as Record<string, FieldValue>
      update.push({
        kind: record.kind,
        id: record.id,
        fields: onto(current, (field) => mine[field], fieldsOf[record.kind]),
      })
    }
  }
  const rebased = { id, label: change.label, create, update, remove }
  return apply(state, rebased).ok ? rebased : undefined
}

function onto(
  current: BookRecord,
  mine: (field: string) => FieldValue | undefined,
  fields: readonly string[],
): FieldUpdate['fields'] {
  const result: FieldUpdate['fields'] = {}
  for (const field of fields) {
    const from = (current as unknown as Record<string, FieldValue>)[field] ?? null
    const to = mine(field) ?? null
    if (from !== to) result[field] = [from, to]
  }
  return result
}
