import type { ComponentId, UnitId } from '../ids'
import type { RecordOf } from '../kinds'
import { type BookState, bookOf } from '../state'
import { type Edit, edit, type MakeId, refuse, updateOf } from './draft'

/** What a unit gains per unit of time, of the total (`componentId` null) or of one component; null clears it. */
export function setInventory(
  state: BookState,
  input: { unitId: UnitId; componentId: ComponentId | null; value: number | null; unit?: string },
  makeId: MakeId,
): Edit {
  const unit = state.unit.get(input.unitId)
  const component = input.componentId === null ? null : state.component.get(input.componentId)
  if (!unit || component === undefined) return refuse(`This ${unit ? 'component' : 'unit'} is no longer in the book.`)
  const old = [...state.inventory.values()].find(
    ({ unitId, componentId }) => unitId === input.unitId && componentId === input.componentId,
  )
  const name = `Inventory change of ${component ? `${component.tag} in ` : ''}${unit.tag}`
  if (input.value === null) return edit(state, makeId, `${name}: cleared`, { remove: old ? [old] : [] })
  const inUnit = input.unit ?? old?.unit ?? bookOf(state).flowUnit
  const label = `${name}: ${input.value} ${inUnit}`
  if (old) return edit(state, makeId, label, { update: [updateOf(old, { value: input.value, unit: inUnit })] })
  const record: RecordOf<'inventory'> = {
    kind: 'inventory',
    id: makeId(),
    unitId: input.unitId,
    componentId: input.componentId,
    value: input.value,
    unit: inUnit,
    note: null,
  }
  return edit(state, makeId, label, { create: [record] })
}
