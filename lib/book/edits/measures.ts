import { measureKey } from '@/lib/balance/measure/measure-name'
import { apply, type FieldUpdate } from '../change'
import { type ComponentId, type MeasureId, measurePartId } from '../ids'
import type { BookRecord, RecordOf } from '../kinds'
import { type Measure, type MeasureQuantity, type MeasureSide, measureName, measureTitle, sidesOf } from '../measures'
import { type BookState, inOrder } from '../state'
import { type Edit, edit, type MakeId, refuse, updateOf } from './draft'

/** What a row is of. Groups hold ids of components; `over` null: over the whole stream. */
export type MeasureInput = {
  name: string
  unit: string
  componentId: ComponentId | null
  element: string | null
  without: readonly ComponentId[]
  group: readonly ComponentId[]
  over: readonly ComponentId[] | null
}

/** A further row of the stream table, after those that there are. Refused where the same measure has a row already. */
export function addMeasure(
  state: BookState,
  quantity: MeasureQuantity,
  input: Partial<MeasureInput>,
  makeId: MakeId,
): Edit {
  const measure: Measure = {
    kind: 'measure',
    id: makeId(),
    name: '',
    quantity,
    componentId: null,
    element: null,
    over: 'stream',
    unit: quantity.endsWith('Ratio') ? '1' : '%',
    position: Math.floor(inOrder(state.measure).at(-1)?.position ?? 0) + 1,
    ...fieldsOf(input),
  }
  const parts = partsFor(measure, input)
  return checked(state, makeId, measure, 'Add row', { create: [measure, ...parts] })
}

/** Another name, unit, component, element or other groups. The quantity stays: values typed in the row are of it. */
export function updateMeasure(state: BookState, id: MeasureId, input: Partial<MeasureInput>, makeId: MakeId): Edit {
  const old = state.measure.get(id)
  if (!old) return refuse('This row is no longer in the book.')
  const measure = { ...old, ...fieldsOf(input) }
  const standing = [...state.measurePart.values()].filter((part) => part.measureId === id)
  const wanted = partsFor(measure, {
    without: input.without ?? idsOn(standing, 'without'),
    group: input.group ?? idsOn(standing, 'group'),
    over: input.over === undefined ? idsOn(standing, 'over') : input.over,
  })
  const kept = new Set(wanted.map((part) => part.id))
  return checked(state, makeId, measure, 'Row', {
    update: [updateOf(old, fieldsOf(input))].filter((update) => update !== undefined),
    create: wanted.filter((part) => !state.measurePart.has(part.id)),
    remove: standing.filter((part) => !kept.has(part.id)),
  })
}

const idsOn = (parts: readonly RecordOf<'measurePart'>[], side: MeasureSide): string[] =>
  parts.filter((part) => part.side === side).map(({ componentId }) => componentId)

function fieldsOf({ name, unit, componentId, element, over }: Partial<MeasureInput>): Partial<Measure> {
  return {
    ...(name !== undefined && { name: name.trim() }),
    ...(unit !== undefined && { unit: unit.trim() }),
    ...(componentId !== undefined && { componentId }),
    ...(element !== undefined && { element: element?.trim() || null }),
    ...(over !== undefined && { over: over === null ? ('stream' as const) : ('group' as const) }),
  }
}

function partsFor(measure: Measure, input: Partial<MeasureInput>): RecordOf<'measurePart'>[] {
  return sidesOf(measure).flatMap((side) =>
    [...new Set(input[side] ?? [])].map((componentId) => ({
      kind: 'measurePart' as const,
      id: measurePartId(measure.id, side, componentId),
      measureId: measure.id,
      side,
      componentId,
    })),
  )
}

type Body = { create?: BookRecord[]; update?: FieldUpdate[]; remove?: BookRecord[] }

/** The edit, once every group of the row has a component and no other row is of the same measure. */
function checked(state: BookState, makeId: MakeId, measure: Measure, verb: string, body: Body): Edit {
  const made = edit(state, makeId, verb, body)
  if (!made.ok) return made
  const after = apply(state, made.value)
  if (!after.ok) throw new Error(`A row that was just made does not apply: ${verb}`)
  const name = measureName(after.state, measure)
  if (typeof name === 'string')
    return refuse('Choose at least one component for each group; over the whole stream where there is no second group.')
  for (const other of state.measure.values()) {
    const its = other.id === measure.id ? '' : measureName(state, other)
    if (typeof its !== 'string' && measureKey(its) === measureKey(name))
      return refuse(`There is already a row of this measure: ${measureTitle(state, other)}.`)
  }
  const title = measureTitle(after.state, measure)
  return { ok: true, value: { ...made.value, label: `${verb} ${title}`.slice(0, 300) } }
}
