import { cellQuantityOn, quantityOn } from '@/lib/balance/measure/cell-quantity'
import type { CellQuantity } from '@/lib/balance/solution'
import type { ComponentId, MeasureId } from '@/lib/book/ids'
import type { RecordOf } from '@/lib/book/kinds'

/** The sections of the stream table under its total. */
export type SectionKey = 'fraction' | 'componentFlow' | 'otherFraction' | 'otherComponentFlow' | 'measures' | 'carried'

export type StreamField = 'tag' | 'name' | 'from' | 'to' | 'phase' | 'density' | 'temperature' | 'pressure'

/** What a row of values shows: a cell of the solver's arrays, the volume flow by density, or a measure that people added. */
export type RowQuantity = CellQuantity | 'volumeFlow' | 'measure'

/** Which row a value stands in. */
export type RowPlace = { quantity: RowQuantity; componentId: ComponentId | null; measureId: MeasureId | null }

/** What a row of the stream table shows. Its id is written from it, so that an id can be read back. */
export type RowRef =
  | { kind: 'field'; field: StreamField }
  | { kind: 'section'; section: SectionKey }
  | ({ kind: 'value' } & RowPlace)

const fields: readonly StreamField[] = ['tag', 'name', 'from', 'to', 'phase', 'density', 'temperature', 'pressure']

export const valueRow = (quantity: RowQuantity, componentId: ComponentId | null = null): string =>
  `value/${quantity}/${componentId ?? ''}`
export const measureRow = (id: MeasureId): string => `value/measure/${id}`
export const rowIdOf = ({ quantity, componentId, measureId }: RowPlace): string =>
  measureId === null ? valueRow(quantity, componentId) : measureRow(measureId)
export const sectionRow = (section: SectionKey): string => `section/${section}`

export function readRow(id: string): RowRef | null {
  const [kind, what = '', of = ''] = id.split('/')
  if (kind === 'section') return { kind, section: what as SectionKey }
  if (kind === 'value' && what === 'measure') return { kind, quantity: what, componentId: null, measureId: of }
  if (kind === 'value') return { kind, quantity: what as RowQuantity, componentId: of || null, measureId: null }
  const field = fields.find((name) => name === id)
  return field ? { kind: 'field', field } : null
}

/** The section that a row of values stands in, so that it can be opened to show the row; null: one that always stands. */
export function sectionOf(row: string): SectionKey | null {
  const ref = readRow(row)
  if (ref?.kind !== 'value' || ref.quantity === 'flow') return null
  if (ref.quantity === 'otherFlow') return 'otherComponentFlow'
  if (ref.quantity === 'measure') return 'measures'
  return ref.quantity === 'volumeFlow' ? 'carried' : ref.quantity
}

type Given = RecordOf<'given'>
export type Quantity = Given['quantity']
type Basis = RecordOf<'book'>['basis']

/** The quantity that a value typed into a row is kept as; a row of a measure says its own. */
export const quantityOf = (quantity: Exclude<RowQuantity, 'measure'>, basis: Basis): Quantity =>
  quantity === 'volumeFlow' ? quantity : quantityOn(basis, quantity)

/** The row that a given stands in. */
export const rowQuantityOf = (quantity: Quantity, basis: Basis): RowQuantity =>
  quantity === 'volumeFlow' ? quantity : (cellQuantityOn(basis, quantity) ?? 'measure')

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
    case 'measure':
      return 'Measure'
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
