import type { Change } from '@/lib/book/change'
import type { RecordProblem } from '@/lib/book/check'
import { fieldsOf } from '@/lib/book/kinds'
import { unstorable } from '../door/words'

/** What no well-meant change holds: fields that its kind does not have, and characters that PostgreSQL cannot keep. */
export function misfits(change: Change): RecordProblem[] {
  const problems: RecordProblem[] = []
  const noSuchField = (field: string) => `There is no field ${field} that could be changed`
  const notKept = 'It holds a character that cannot be kept'
  if (holdsUnstorable([change.id, change.label])) problems.push({ kind: 'book', id: '', what: notKept })
  for (const { kind, id, fields } of change.update)
    for (const [field, values] of Object.entries(fields)) {
      if (!fieldsOf[kind].includes(field)) problems.push({ kind, id, field, what: noSuchField(field) })
      if (holdsUnstorable(values)) problems.push({ kind, id, field, what: notKept })
    }
  for (const record of [...change.create, ...change.remove])
    for (const [field, value] of Object.entries(record))
      if (holdsUnstorable([value])) problems.push({ kind: record.kind, id: record.id, field, what: notKept })
  return problems
}

const holdsUnstorable = (values: readonly unknown[]): boolean =>
  values.some((value) => typeof value === 'string' && unstorable.test(value))
