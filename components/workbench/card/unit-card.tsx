'use client'

import { Field } from '@/components/ui/field'
import { Select } from '@/components/ui/select'
import { parseFlowUnit } from '@/lib/balance/measure/units-of-measure'
import { setFields } from '@/lib/book/edits/fields'
import { setInventory } from '@/lib/book/edits/inventory'
import { newId } from '@/lib/book/ids'
import { type RecordOf, unitKinds } from '@/lib/book/kinds'
import { plainNumber } from '@/lib/sheet/format'
import { readNumber } from '@/lib/sheet/read-number'
import type { BookView } from '../book-view'
import { CommitInput } from '../commit-input'
import type { Desk } from '../desk'
import { sentence } from '../words'
import { CardHead, CardSection } from './card-parts'

type Unit = RecordOf<'unit'>

/** A unit: name, kind, what it balances, and what it gains while it runs. */
export function UnitCard({ view, desk, unit }: { view: BookView; desk: Desk; unit: Unit }) {
  const { state, mayEdit, book } = view
  const troubles = view.unitTroubles.get(unit.id) ?? []
  const set = (fields: Partial<Unit>) => desk.run(setFields(state, 'unit', unit.id, fields, newId))
  const gains = [...state.inventory.values()].filter(({ unitId }) => unitId === unit.id)
  const gainOf = (componentId: string | null) => gains.find((gain) => gain.componentId === componentId)
  const places: [string | null, string][] = [
    [null, 'Total'],
    ...view.components.map(({ id, tag }): [string, string] => [id, tag]),
  ]
  return (
    <>
      <CardHead where={`Unit · ${unit.unitKind}`} title={unit.tag} />
      {troubles.map(({ text }) => (
        <p key={text} className="mt-2 rounded-control bg-odds px-3 py-2 text-sm">
          {text}
        </p>
      ))}
      <fieldset disabled={!mayEdit} className="contents">
        <div className="mt-3 grid gap-2.5">
          <CommitInput label="Name" value={unit.name} onCommit={(text) => set({ name: text.trim() })} />
          <Field label="Kind">
            {(describing) => (
              <Select
                {...describing}
                value={unit.unitKind}
                onChange={(event) => set({ unitKind: event.target.value as Unit['unitKind'] })}
              >
                {unitKinds.map((kind) => (
                  <option key={kind} value={kind}>
                    {sentence(kind)}
                  </option>
                ))}
              </Select>
            )}
          </Field>
          <Field label="Balances">
            {(describing) => (
              <Select
                {...describing}
                value={unit.balance}
                onChange={(event) => set({ balance: event.target.value as Unit['balance'] })}
              >
                <option value="components">Each component</option>
                <option value="elements">Each element (needs formulas)</option>
              </Select>
            )}
          </Field>
          <CommitInput
            label="Note"
            lines
            value={unit.note ?? ''}
            onCommit={(text) => set({ note: text.trim() || null })}
          />
        </div>
        <CardSection title="Inventory change">
          <p className="mb-2 text-sm text-ink-3">
            What the unit holds more at the end than at the start, per unit of time.
          </p>
          <div className="grid grid-cols-2 gap-2.5">
            {places.map(([componentId, words]) => {
              const gain = gainOf(componentId)
              return (
                <CommitInput
                  key={componentId ?? 'total'}
                  label={`${words}, ${gain?.unit ?? book.flowUnit}`}
                  inputMode="decimal"
                  value={gain ? plainNumber(gain.value, view.decimal) : ''}
                  onCommit={(text) => {
                    if (text.trim() === '')
                      return desk.run(setInventory(state, { unitId: unit.id, componentId, value: null }, newId))
                    const number = readNumber(text, view.decimal)
                    if (!number.ok) return number.reason
                    const typed = number.rest === '' ? undefined : parseFlowUnit(number.rest)?.symbol
                    if (number.rest !== '' && typed === undefined)
                      return `“${number.rest}” is not a unit of flow known here.`
                    const unitOfIt = typed === undefined ? {} : { unit: typed }
                    return desk.run(
                      setInventory(state, { unitId: unit.id, componentId, value: number.value, ...unitOfIt }, newId),
                    )
                  }}
                />
              )
            })}
          </div>
        </CardSection>
      </fieldset>
    </>
  )
}
