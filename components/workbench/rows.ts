import type { CellQuantity } from '@/lib/balance/solution'
import type { ComponentId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'

/** The sections of the stream table under its total. */
export type SectionKey = 'fraction' | 'componentFlow' | 'otherFraction' | 'otherComponentFlow' | 'carried'

export type StreamField = 'tag' | 'name' | 'from' | 'to' | 'phase' | 'density' | 'temperature' | 'pressure'

/** What a row of values shows: a cell of the solver's arrays, or the volume flow that follows from a density. */
export type RowQuantity = CellQuantity | 'volumeFlow'

/** What a row of the stream table shows. Its id is written from it, so that an id can be read back. */
export type RowRef =
  | { kind: 'field'; field: StreamField }
  | { kind: 'section'; section: SectionKey }
  | { kind: 'value'; quantity: RowQuantity; componentId: ComponentId | null }

const fields: readonly StreamField[] = ['tag', 'name', 'from', 'to', 'phase', 'density', 'temperature', 'pressure']

export const valueRow = (quantity: RowQuantity, componentId: ComponentId | null = null): string =>
  `value/${quantity}/${componentId ?? ''}`
export const sectionRow = (section: SectionKey): string => `section/${section}`

export function readRow(id: string): RowRef | null {
  const [kind, what = '', componentId = ''] = id.split('/')
  if (kind === 'section') return { kind, section: what as SectionKey }
  if (kind === 'value') return { kind, quantity: what as RowQuantity, componentId: componentId || null }
  const field = fields.find((name) => name === id)
  return field ? { kind: 'field', field } : null
}

/** The section that a row of values stands in, so that it can be opened to show the row; null: one that always stands. */
export function sectionOf(row: string): SectionKey | null {
  const ref = readRow(row)
  if (ref?.kind !== 'value' || ref.quantity === 'flow') return null
  if (ref.quantity === 'otherFlow') return 'otherComponentFlow'
  return ref.quantity === 'volumeFlow' ? 'carried' : ref.quantity
}

type Given = RecordOf<'given'>
export type Quantity = Given['quantity']
type Basis = RecordOf<'book'>['basis']

/** The quantity that a value typed into a row is kept as. */
export function quantityOf(quantity: RowQuantity, basis: Basis): Quantity {
  const mass = basis === 'mass'
  switch (quantity) {
    case 'flow':
    case 'componentFlow':
    case 'volumeFlow':
      return quantity
    case 'fraction':
      return mass ? 'massFraction' : 'moleFraction'
    case 'otherFlow':
      return mass ? 'moleFlow' : 'massFlow'
    case 'otherComponentFlow':
      return mass ? 'componentMoleFlow' : 'componentMassFlow'
    case 'otherFraction':
      return mass ? 'moleFraction' : 'massFraction'
  }
}

/** The row that a given stands in. */
export function rowQuantityOf(quantity: Quantity, basis: Basis): RowQuantity {
  const mass = basis === 'mass'
  switch (quantity) {
    case 'flow':
    case 'componentFlow':
      return quantity
    case 'massFlow':
      return mass ? 'flow' : 'otherFlow'
    case 'moleFlow':
      return mass ? 'otherFlow' : 'flow'
    case 'componentMassFlow':
      return mass ? 'componentFlow' : 'otherComponentFlow'
    case 'componentMoleFlow':
      return mass ? 'otherComponentFlow' : 'componentFlow'
    case 'massFraction':
      return mass ? 'fraction' : 'otherFraction'
    case 'moleFraction':
      return mass ? 'otherFraction' : 'fraction'
    case 'volumeFlow':
      return quantity
  }
}

/** Heads as reports print them. */
export function rowTitle(quantity: RowQuantity, basis: Basis): string {
  const [own, other] = basis === 'mass' ? ['Mass', 'Mole'] : ['Mole', 'Mass']
  switch (quantity) {
    case 'flow':
      return 'Total flow'
    case 'componentFlow':
      return 'Component flow'
    case 'fraction':
      return `${own} fraction`
    case 'otherFlow':
      return `Total ${other.toLowerCase()} flow`
    case 'otherComponentFlow':
      return `Component ${other.toLowerCase()} flow`
    case 'otherFraction':
      return `${other} fraction`
    case 'volumeFlow':
      return 'Volume flow'
  }
}

export const fieldTitle: Record<StreamField, string> = {
  tag: 'Stream',
  name: 'Name',
  from: 'From',
  to: 'To',
  phase: 'Phase',
  density: 'Density',
  temperature: 'Temperature',
  pressure: 'Pressure',
}
