import { measureKey } from '@/lib/balance/measure/measure-name'
import type { MeasureName, Problem } from '@/lib/balance/problem'
import { measurePartId } from './ids'
import type { BookRecord } from './kinds'
import { isMeasureQuantity } from './measures'

/** One row for each measure that givens of a problem name with groups or an element; `idOf` finds the row of a given. */
export function rowRecords(
  problem: Problem,
  makeId: () => string,
  componentId: (tag: string) => string,
): { records: BookRecord[]; idOf: (name: MeasureName) => string | null } {
  const records: BookRecord[] = []
  const ids = new Map<string, string>()
  for (const given of problem.givens ?? []) {
    const { quantity, component, element = null, unit } = given
    if (!isMeasureQuantity(quantity) || ids.has(measureKey(given))) continue
    const id = makeId()
    ids.set(measureKey(given), id)
    records.push({
      kind: 'measure',
      id,
      name: '',
      quantity,
      componentId: component === undefined ? null : componentId(component),
      element,
      over: given.over ? 'group' : 'stream',
      unit: unit ?? (quantity.endsWith('Ratio') ? '1' : '%'),
      position: ids.size,
    })
    for (const side of ['without', 'group', 'over'] as const)
      for (const tag of given[side === 'group' ? 'parts' : side] ?? []) {
        const part = componentId(tag)
        records.push({
          kind: 'measurePart',
          id: measurePartId(id, side, part),
          measureId: id,
          side,
          componentId: part,
        })
      }
  }
  return { records, idOf: (name) => ids.get(measureKey(name)) ?? null }
}
