'use client'

import { renameTag, setFields } from '@/lib/book/edits/fields'
import { newId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'
import { plainNumber } from '@/lib/sheet/format'
import { readNumber } from '@/lib/sheet/read-number'
import type { BookView } from '../book-view'
import { CommitInput } from '../commit-input'
import type { Desk } from '../desk'
import { CardHead } from './card-parts'

type ComponentFieldsProps = { view: BookView; desk: Desk; component: RecordOf<'component'> }

/** A component: tag, name, formula, molar mass. */
export function ComponentCard(props: ComponentFieldsProps) {
  return (
    <>
      <CardHead where="Component" title={props.component.tag} />
      <ComponentFields {...props} />
    </>
  )
}

export function ComponentFields({ view, desk, component }: ComponentFieldsProps) {
  const { state, mayEdit } = view
  const set = (fields: Partial<RecordOf<'component'>>) =>
    desk.run(setFields(state, 'component', component.id, fields, newId))
  return (
    <fieldset disabled={!mayEdit} className="mt-3 grid gap-2.5">
      <CommitInput
        label="Tag"
        value={component.tag}
        onCommit={(text) => desk.run(renameTag(state, 'component', component.id, text, newId))}
      />
      <CommitInput label="Name" value={component.name} onCommit={(text) => set({ name: text.trim() })} />
      <CommitInput
        label="Chemical formula"
        placeholder="NaCl"
        value={component.formula ?? ''}
        onCommit={(text) => set({ formula: text.trim() || null })}
      />
      <CommitInput
        label="Molar mass, kg/kmol"
        hint="Left empty: from the formula"
        inputMode="decimal"
        value={component.molarMass === null ? '' : plainNumber(component.molarMass, view.decimal)}
        onCommit={(text) => {
          if (text.trim() === '') return set({ molarMass: null })
          const number = readNumber(text, view.decimal)
          if (!number.ok) return number.reason
          if (!/^(|kg\/kmol|g\/mol)$/.test(number.rest)) return 'The molar mass is in kg/kmol: type the number alone.'
          return number.value > 0 ? set({ molarMass: number.value }) : 'A molar mass is more than 0 kg/kmol.'
        }}
      />
    </fieldset>
  )
}
