'use client'

import { Trash2 } from 'lucide-react'
import { IconButton } from '@/components/ui/button'
import { renameTag, setFields } from '@/lib/book/edits/fields'
import { remove } from '@/lib/book/edits/remove'
import { newId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { plainNumber } from '@/lib/sheet/format'
import { readNumber } from '@/lib/sheet/read-number'
import type { BookView } from '../book-view'
import { CommitInput } from '../commit-input'
import type { Desk } from '../desk'

/** A named number that rules share; without a value it is free. */
export function ParameterLine({
  view,
  desk,
  parameter,
}: {
  view: BookView
  desk: Desk
  parameter: RecordOf<'parameter'>
}) {
  const { state, mayEdit } = view
  return (
    <li className="flex flex-wrap items-end gap-2.5 px-4 py-2.5">
      <CommitInput
        label="Parameter"
        className="w-28 text-xs [&_input]:h-8"
        value={parameter.tag}
        disabled={!mayEdit}
        onCommit={(text) => desk.run(renameTag(state, 'parameter', parameter.id, text, newId))}
      />
      <CommitInput
        label="Value"
        className="w-28 text-xs [&_input]:h-8"
        placeholder="free"
        inputMode="decimal"
        value={parameter.value === null ? '' : plainNumber(parameter.value, view.decimal)}
        disabled={!mayEdit}
        onCommit={(text) => {
          if (text.trim() === '') return desk.run(setFields(state, 'parameter', parameter.id, { value: null }, newId))
          const number = readNumber(text, view.decimal)
          if (!number.ok) return number.reason
          if (number.rest !== '' && number.rest !== '%') return 'A parameter is a plain number or a percentage.'
          const value = number.rest === '%' ? Number((number.value / 100).toPrecision(15)) : number.value
          return desk.run(setFields(state, 'parameter', parameter.id, { value }, newId))
        }}
      />
      <CommitInput
        label="Note"
        className="min-w-40 flex-1 text-xs [&_input]:h-8"
        value={parameter.note ?? ''}
        disabled={!mayEdit}
        onCommit={(text) => desk.run(setFields(state, 'parameter', parameter.id, { note: text.trim() || null }, newId))}
      />
      {mayEdit ? (
        <IconButton
          size="small"
          label={`Remove parameter ${parameter.tag}`}
          onClick={() => desk.tryRun(remove(state, 'parameter', [parameter.id], newId))}
        >
          <Trash2 className="size-4" aria-hidden="true" />
        </IconButton>
      ) : null}
    </li>
  )
}
