'use client'

import { Field } from '@/components/ui/field'
import { Select } from '@/components/ui/select'
import { setFractions } from '@/lib/book/edits/fields'
import { absenceId, newId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'

type Stream = RecordOf<'stream'>
type FractionChoiceProps = { view: BookView; desk: Desk; stream: Stream; label?: string; onDone?: () => void }

/** What is done with typed fractions of a stream that do not add up: the person's choice, never the program's. */
export function FractionChoice({
  view,
  desk,
  stream,
  label = 'Fractions that do not add up',
  onDone,
}: FractionChoiceProps) {
  const present = view.components.filter(({ id }) => !view.state.absence.has(absenceId(stream.id, id)))
  return (
    <Field label={label}>
      {(describing) => (
        <Select
          {...describing}
          value={stream.fractions === 'difference' ? (stream.differenceComponentId ?? '') : stream.fractions}
          disabled={!view.mayEdit}
          onChange={(event) => {
            const { value } = event.target
            const choice = value === 'asTyped' || value === 'scale' ? value : { difference: value }
            if (desk.tryRun(setFractions(view.state, stream.id, choice, newId))) onDone?.()
          }}
        >
          <option value="asTyped">Stay as typed</option>
          <option value="scale">Are scaled to 1</option>
          {present.map(({ id, tag, name }) => (
            <option key={id} value={id}>
              {name || tag} is by difference
            </option>
          ))}
        </Select>
      )}
    </Field>
  )
}

/** What was chosen, for the head of the stream: short to see, and in words; null while fractions stay as typed. */
export function fractionChoice(view: BookView, stream: Stream): { mark: string; words: string } | null {
  if (stream.fractions === 'scale') return { mark: 'Σ = 1', words: 'typed fractions are scaled to 1' }
  if (stream.fractions !== 'difference') return null
  const component = view.state.component.get(stream.differenceComponentId ?? '')
  return component
    ? { mark: `1 − ${component.tag}`, words: `${component.name || component.tag} is by difference` }
    : null
}
