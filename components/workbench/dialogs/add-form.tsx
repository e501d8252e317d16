'use client'

import { type FormEvent, useState } from 'react'
import { Button } from '@/components/ui/button'
import { DialogActions } from '@/components/ui/dialog'
import { Field, TextArea } from '@/components/ui/field'
import { NAME_COLUMN } from '@/hooks/grid-model'
import { addComponents, addStreams, addUnits } from '@/lib/book/edits/add'
import { counted, type Edit } from '@/lib/book/edits/draft'
import { newId } from '@/lib/book/ids'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'
import { valueRow } from '../rows'
import { readList } from './read-list'

type What = 'stream' | 'component' | 'unit'

export const addWords: Record<What, { title: string; hint: string; placeholder: string }> = {
  stream: {
    title: 'Add streams',
    hint: 'One on each line: the tag, and after a tab its name. Paste a list from a spreadsheet, or leave it empty for the next tag.',
    placeholder: '101\tFeed\n102\tProduct',
  },
  component: {
    title: 'Add components',
    hint: 'One on each line: the tag, and after tabs its name, formula and molar mass in kg/kmol.',
    placeholder: 'H2O\tWater\tH2O\nNaCl\tSodium chloride\tNaCl',
  },
  unit: {
    title: 'Add units',
    hint: 'One on each line: the tag, and after tabs its name and kind (mixer, splitter, separator or reactor).',
    placeholder: 'T-101\tFeed tank\tmixer\nS-102\tCentrifuge\tseparator',
  },
}

type AddFormProps = { view: BookView; desk: Desk; what: What; after: string | null | undefined; onDone: () => void }

/** Adds one or a pasted list, as one change. */
export function AddForm({ view, desk, what, after, onDone }: AddFormProps) {
  const [text, setText] = useState('')
  const [reason, setReason] = useState<string | undefined>()
  const list = readList(what, text, view.decimal)
  const submit = (event?: FormEvent) => {
    event?.preventDefault()
    if (typeof list === 'string') return setReason(list)
    const items = list.length === 0 ? [{}] : list
    const edit = made(view, what, items, after)
    const refused = desk.run(edit)
    if (refused) return setReason(refused)
    const first = edit.ok ? edit.value.create.find(({ kind }) => kind === what) : undefined
    if (first && what === 'stream') desk.show('table', { row: 'tag', column: first.id })
    if (first && what === 'component') desk.show('table', { row: valueRow('fraction', first.id), column: NAME_COLUMN })
    if (first && what === 'unit') desk.show('links', { row: first.id, column: NAME_COLUMN })
    onDone()
  }
  const count = typeof list === 'string' ? null : Math.max(1, list.length)
  return (
    <form onSubmit={submit}>
      <Field label={`${what[0]?.toUpperCase()}${what.slice(1)}s`} error={reason}>
        {(describing) => (
          <TextArea
            {...describing}
            autoFocus
            rows={7}
            className="font-mono text-sm"
            placeholder={addWords[what].placeholder}
            value={text}
            onChange={(event) => {
              setText(event.target.value)
              setReason(undefined)
            }}
            onKeyDown={(event) => {
              if (event.key === 'Enter' && (event.ctrlKey || event.metaKey)) submit()
            }}
          />
        )}
      </Field>
      <DialogActions>
        <Button onClick={onDone}>Cancel</Button>
        <Button look="main" type="submit">
          Add {count === null ? 'them' : counted(count, what)}
        </Button>
      </DialogActions>
    </form>
  )
}

function made(view: BookView, what: What, items: readonly object[], after: string | null | undefined): Edit {
  const added = { items: items as never, ...(after === undefined ? {} : { after }) }
  const { state } = view
  if (what === 'stream') return addStreams(state, added, newId)
  return what === 'component' ? addComponents(state, added, newId) : addUnits(state, added, newId)
}
