import type { MeasureName } from '@/lib/balance/problem'
import { measureQuantities, type RecordOf } from './kinds'
import { type BookState, inOrder } from './state'

export type Measure = RecordOf<'measure'>
export type MeasureQuantity = Measure['quantity']
export type MeasureSide = RecordOf<'measurePart'>['side']

export const isMeasureQuantity = (quantity: string): quantity is MeasureQuantity =>
  (measureQuantities as readonly string[]).includes(quantity)

/** The groups that a quantity is made of. Of a group ratio 'over' only where it is not over the whole stream. */
export function sidesOf({ quantity, over }: Pick<Measure, 'quantity' | 'over'>): readonly MeasureSide[] {
  switch (quantity) {
    case 'dryMassFraction':
    case 'dryMoleFraction':
      return ['without']
    case 'elementMassFraction':
      return []
    case 'groupMassRatio':
    case 'groupMoleRatio':
      return over === 'group' ? ['group', 'over'] : ['group']
  }
}

/** Components of a group of a row, in book order. */
export function partsOf(state: BookState, measureId: string, side: MeasureSide): RecordOf<'component'>[] {
  const ids = new Set<string>()
  for (const part of state.measurePart.values())
    if (part.measureId === measureId && part.side === side) ids.add(part.componentId)
  return ids.size === 0 ? [] : inOrder(state.component).filter(({ id }) => ids.has(id))
}

/** What names the row's measure for the solver, by tags; a sentence where a group of it has become empty. */
export function measureName(state: BookState, measure: Measure): MeasureName | string {
  const name: MeasureName = { quantity: measure.quantity }
  if (measure.componentId !== null) {
    const component = state.component.get(measure.componentId)
    if (!component) return `${measureTitle(state, measure)}: its component is gone. Remove the row.`
    name.component = component.tag.trim()
  }
  if (measure.element !== null) name.element = measure.element
  for (const side of sidesOf(measure)) {
    const tags = partsOf(state, measure.id, side).map(({ tag }) => tag.trim())
    if (tags.length === 0)
      return `${measureTitle(state, measure)}: a group of it has no component left. Remove the row, or add to the group.`
    name[side === 'group' ? 'parts' : side] = tags
  }
  return name
}

/** What the row is called: its name or, without one, what it is: "NaCl, dry of H2O", "Cu in all", "solids : liquid". */
export function measureTitle(state: BookState, measure: Measure): string {
  if (measure.name !== '') return measure.name
  const tags = (side: MeasureSide): string =>
    partsOf(state, measure.id, side)
      .map(({ tag }) => tag)
      .join(' + ') || '?'
  switch (measure.quantity) {
    case 'dryMassFraction':
    case 'dryMoleFraction':
      return `${state.component.get(measure.componentId ?? '')?.tag ?? '?'} without ${tags('without')}`
    case 'elementMassFraction':
      return `Element ${measure.element}`
    case 'groupMassRatio':
    case 'groupMoleRatio':
      return measure.over === 'stream' ? `${tags('group')} in all` : `${tags('group')} : ${tags('over')}`
  }
}

export const measureKinds: { readonly [Q in MeasureQuantity]: string } = {
  dryMassFraction: 'Mass fraction, dry basis',
  dryMoleFraction: 'Mole fraction, dry basis',
  elementMassFraction: 'Mass fraction of an element',
  groupMassRatio: 'Mass ratio of groups',
  groupMoleRatio: 'Mole ratio of groups',
}
