import { atomicWeights } from '@/lib/balance/chemistry/atomic-weights'
import type { RecordProblem } from './check'
import type { RecordOf } from './kinds'
import { measureTitle, sidesOf } from './measures'
import type { BookState } from './state'
import { unitFits } from './units'

/** A row names what its quantity is made of, an element that there is and a unit that fits; a part stands on a side that it has. */
export function checkMeasure(
  after: BookState,
  record: RecordOf<'measure'> | RecordOf<'measurePart'>,
  problems: RecordProblem[],
): void {
  const { kind, id } = record
  const say = (field: string, what: string): void => {
    problems.push({ kind, id, field, what })
  }
  if (record.kind === 'measurePart') {
    const measure = after.measure.get(record.measureId)
    if (measure && !sidesOf(measure).includes(record.side))
      say('side', `Row ${measureTitle(after, measure)} has no such group`)
    return
  }
  const title = measureTitle(after, record)
  const isDry = record.quantity === 'dryMassFraction' || record.quantity === 'dryMoleFraction'
  if (isDry !== (record.componentId !== null)) say('componentId', `Row ${title}: say which component it is of`)
  if ((record.quantity === 'elementMassFraction') !== (record.element !== null))
    say('element', `Row ${title}: say which element it is of`)
  else if (record.element !== null && !Object.hasOwn(atomicWeights, record.element))
    say('element', `“${record.element}” is no element known here: type its symbol, such as Cu or S`)
  if (record.over === 'group' && !sidesOf(record).includes('over'))
    say('over', `Row ${title} has no group to divide by`)
  if (!unitFits(record.unit, record.quantity, 'mass', 'kg/h'))
    say('unit', `Row ${title}: “${record.unit}” does not fit a ratio on this basis: %, ppm or 1 would`)
}
