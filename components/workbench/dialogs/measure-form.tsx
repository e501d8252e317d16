'use client'

import { type FormEvent, useState } from 'react'
import { Button } from '@/components/ui/button'
import { DialogActions } from '@/components/ui/dialog'
import { Field, Input } from '@/components/ui/field'
import { Select } from '@/components/ui/select'
import { NAME_COLUMN } from '@/hooks/grid-model'
import { addMeasure, type MeasureInput, updateMeasure } from '@/lib/book/edits/measures'
import { newId } from '@/lib/book/ids'
import { measureQuantities } from '@/lib/book/kinds'
import { type Measure, type MeasureQuantity, measureKinds, partsOf } from '@/lib/book/measures'
import { unitKindOf, unitsFor } from '@/lib/book/units'
import type { BookView } from '../book-view'
import type { Desk } from '../desk'
import { measureRow } from '../rows'

type MeasureFormProps = { view: BookView; desk: Desk; measure: Measure | undefined; onDone: () => void }

/** A row of the table that is of groups or an element: what it is of, its name and the unit that it shows. */
export function MeasureForm({ view, desk, measure, onDone }: MeasureFormProps) {
  const [quantity, setQuantity] = useState<MeasureQuantity>(measure?.quantity ?? 'groupMassRatio')
  const [input, setInput] = useState<MeasureInput>(() => inputOf(view, measure))
  const [reason, setReason] = useState<string | undefined>()
  const set = (fields: Partial<MeasureInput>) => {
    setInput({ ...input, ...fields })
    setReason(undefined)
  }
  const submit = (event: FormEvent) => {
    event.preventDefault()
    const wanted = onlyFor(quantity, input)
    const edit = measure
      ? updateMeasure(view.state, measure.id, wanted, newId)
      : addMeasure(view.state, quantity, wanted, newId)
    const refused = desk.run(edit)
    if (refused) return setReason(refused)
    const id = measure?.id ?? (edit.ok ? edit.value.create.find(({ kind }) => kind === 'measure')?.id : undefined)
    if (id) desk.show('table', { row: measureRow(id), column: NAME_COLUMN })
    onDone()
  }
  const isDry = quantity === 'dryMassFraction' || quantity === 'dryMoleFraction'
  const isGroup = quantity === 'groupMassRatio' || quantity === 'groupMoleRatio'
  return (
    <form onSubmit={submit} className="grid gap-3">
      <Field label="Kind" error={reason}>
        {(describing) => (
          <Select
            {...describing}
            value={quantity}
            disabled={measure !== undefined}
            onChange={(event) => {
              const next = event.target.value as MeasureQuantity
              setQuantity(next)
              set({ unit: next.startsWith('group') ? '1' : '%' })
            }}
          >
            {measureQuantities.map((one) => (
              <option key={one} value={one}>
                {measureKinds[one]}
              </option>
            ))}
          </Select>
        )}
      </Field>
      {isDry ? (
        <>
          <Field label="Component">
            {(describing) => (
              <Select
                {...describing}
                value={input.componentId ?? ''}
                onChange={(event) => set({ componentId: event.target.value || null })}
              >
                <option value="">Choose …</option>
                {view.components.map(({ id, tag, name }) => (
                  <option key={id} value={id}>
                    {name || tag}
                  </option>
                ))}
              </Select>
            )}
          </Field>
          <Group view={view} title="Without" chosen={input.without} onChange={(without) => set({ without })} />
        </>
      ) : null}
      {quantity === 'elementMassFraction' ? (
        <Field label="Element" hint="Its symbol; every component of the stream needs a formula">
          {(describing) => (
            <Input
              {...describing}
              className="w-24"
              value={input.element ?? ''}
              placeholder="Cu"
              onChange={(event) => set({ element: event.target.value })}
            />
          )}
        </Field>
      ) : null}
      {isGroup ? (
        <>
          <Group view={view} title="Sum of" chosen={input.group} onChange={(group) => set({ group })} />
          <Field label="Divided by">
            {(describing) => (
              <Select
                {...describing}
                value={input.over === null ? 'stream' : 'group'}
                onChange={(event) => set({ over: event.target.value === 'stream' ? null : [] })}
              >
                <option value="stream">The whole stream</option>
                <option value="group">The sum of these:</option>
              </Select>
            )}
          </Field>
          {input.over === null ? null : (
            <Group view={view} title="Sum under it" chosen={input.over} onChange={(over) => set({ over })} />
          )}
        </>
      ) : null}
      <div className="grid grid-cols-2 gap-3">
        <Field label="Name" hint="Left empty: after what it is">
          {(describing) => (
            <Input {...describing} value={input.name} onChange={(event) => set({ name: event.target.value })} />
          )}
        </Field>
        <Field label="Unit" hint="1 is a plain ratio">
          {(describing) => (
            <Select {...describing} value={input.unit} onChange={(event) => set({ unit: event.target.value })}>
              {unitsFor(unitKindOf(quantity, view.book.basis)).map((unit) => (
                <option key={unit}>{unit}</option>
              ))}
            </Select>
          )}
        </Field>
      </div>
      <DialogActions>
        <Button onClick={onDone}>Cancel</Button>
        <Button look="main" type="submit">
          {measure ? 'Keep' : 'Add row'}
        </Button>
      </DialogActions>
    </form>
  )
}

function inputOf({ state }: BookView, measure: Measure | undefined): MeasureInput {
  if (!measure) return { name: '', unit: '1', componentId: null, element: null, without: [], group: [], over: null }
  const ids = (side: 'without' | 'group' | 'over') => partsOf(state, measure.id, side).map(({ id }) => id)
  return {
    name: measure.name,
    unit: measure.unit,
    componentId: measure.componentId,
    element: measure.element,
    without: ids('without'),
    group: ids('group'),
    over: measure.over === 'group' ? ids('over') : null,
  }
}

/** What was typed for another kind meanwhile stays out. */
function onlyFor(quantity: MeasureQuantity, input: MeasureInput): MeasureInput {
  const nothing = { componentId: null, element: null, without: [], group: [], over: null }
  const { name, unit, componentId, element, without, group, over } = input
  if (quantity === 'elementMassFraction') return { ...nothing, name, unit, element }
  return quantity.startsWith('dry')
    ? { ...nothing, name, unit, componentId, without }
    : { ...nothing, name, unit, group, over }
}

type GroupProps = {
  view: BookView
  title: string
  chosen: readonly string[]
  onChange: (ids: string[]) => void
}

function Group({ view, title, chosen, onChange }: GroupProps) {
  return (
    <fieldset>
      <legend className="mb-1 font-semibold">{title}</legend>
      <div className="flex flex-wrap gap-x-4 gap-y-1.5">
        {view.components.map(({ id, tag, name }) => (
          <label key={id} className="flex items-center gap-1.5">
            <input
              type="checkbox"
              className="size-4 accent-(--brook)"
              checked={chosen.includes(id)}
              onChange={(event) =>
                onChange(event.target.checked ? [...chosen, id] : chosen.filter((one) => one !== id))
              }
            />
            {name || tag}
          </label>
        ))}
      </div>
    </fieldset>
  )
}
