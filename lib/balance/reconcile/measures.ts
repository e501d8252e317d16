import { deviationOf, type Estimate } from '../estimate/estimate'
import { addGradient, type ExactSpace, gradientOf } from '../estimate/exact-space'
import { formAt, measureAt, type Reading } from '../estimate/readings'
import { onFree } from '../estimate/tied'
import type { Measure } from '../measure/measure'
import { placeOf as placeOfGiven } from '../measure/measure-name'
import type { Model } from '../model'
import { type Place, slotOf } from '../solution'
import { cellQuantityOf, forEachCell, quantityOfCell } from '../states/cells'
import type { MeasureClass, ReconciledMeasure } from './reconciliation'
import type { ReadingTest } from './test-readings'

/** A gradient that cancels to this part of its terms does not move: the measure holds exactly. */
const HOLDS = 1e-9

/** Cells of the book's basis, then one row for each reading that no cell shows. Standard deviations by JCGM 100, 5.2. */
export function reconciledMeasures(
  model: Model,
  space: ExactSpace,
  readings: readonly Reading[],
  est: Estimate,
  tests: readonly ReadingTest[],
): ReconciledMeasure[] {
  const shown = new Map<number, number>()
  inDisplayOrder(readings).forEach((i) => {
    const { given, stream, component } = readings[i] as Reading
    const quantity = cellQuantityOf(model, given.quantity)
    if (quantity === 'flow' || quantity === 'componentFlow' || quantity === 'fraction') {
      const slot = slotOf(model.nComponents, stream, quantity, Math.max(component, 0))
      if (!shown.has(slot)) shown.set(slot, i)
    }
  })
  const found: ReconciledMeasure[] = []
  const measured = (i: number, measure: Measure): Partial<ReconciledMeasure> & { class: MeasureClass } => {
    const { value: reading, sigma } = readings[i] as Reading
    const { free, standardised } = tests[i] as ReadingTest
    const its = stateOf(space, est, measure)
    const adjustment = its.value === undefined ? undefined : reading - its.value
    return {
      class: free > 0 ? 'redundant' : its.class === 'observable' ? 'justDetermined' : its.class,
      reading,
      sigma,
      ...(its.value !== undefined && { value: its.value, standardDeviation: its.deviation }),
      ...(adjustment !== undefined && { adjustment }),
      standardised: standardised ?? null,
    }
  }
  forEachCell(model, ({ slot, stream, component, quantity, measure }) => {
    if (quantity !== 'flow' && quantity !== 'componentFlow' && quantity !== 'fraction') return
    const i = shown.get(slot)
    const place = {
      stream: model.problem.streams[stream]?.id as string,
      quantity: quantityOfCell(model, quantity),
      ...(component >= 0 && { component: model.problem.components[component]?.id as string }),
    }
    const reading = i === undefined ? undefined : (readings[i] as Reading)
    if (i !== undefined && reading) found.push({ ...place, ...instrumentOf(reading), ...measured(i, measure) })
    else {
      const its = stateOf(space, est, measure)
      found.push({
        ...place,
        class: its.class,
        ...(its.value !== undefined && { value: its.value, standardDeviation: its.deviation }),
      })
    }
  })
  const inCells = new Set(shown.values())
  readings.forEach((reading, i) => {
    if (inCells.has(i)) return
    found.push({
      ...placeOf(reading),
      ...measured(i, reading.measure),
    })
  })
  return found
}

const instrumentOf = ({ given }: Reading): { instrument?: string } =>
  given.instrument === undefined ? {} : { instrument: given.instrument }

/** Where a reading stands, as it was typed. */
export const placeOf = ({ given }: Reading): Place => placeOfGiven(given)

/** Indexes of readings, the one that a cell shows first: 'main', then by name. */
function inDisplayOrder(readings: readonly Reading[]): number[] {
  const rank = (i: number): string => {
    const instrument = readings[i]?.given.instrument
    return instrument === undefined || instrument === 'main' ? '' : `~${instrument}`
  }
  return [...readings.keys()].sort((a, b) => (rank(a) < rank(b) ? -1 : rank(a) > rank(b) ? 1 : a - b))
}

/** Class, value and standard deviation of one measure by the estimate. */
export function stateOf(
  space: ExactSpace,
  est: Estimate,
  measure: Measure,
): { class: 'exact' | 'observable' | 'unobservable'; value?: number; deviation: number } {
  const value = measureAt(measure, est.x)
  if (Number.isNaN(value)) return { class: 'unobservable', deviation: Number.NaN }
  const g = gradientOf(space, measure, est.x)
  if (doesNotMove(space, est, measure, g)) return { class: 'exact', value, deviation: 0 }
  const { deviation } = deviationOf(est, g)
  return Number.isNaN(deviation) ? { class: 'unobservable', deviation } : { class: 'observable', value, deviation }
}

function doesNotMove(
  space: ExactSpace,
  { ties, scale, x }: Estimate,
  { numerator, denominator }: Measure,
  g: Float64Array,
): boolean {
  const size = (of: Float64Array, places?: readonly number[]): number =>
    of.reduce(
      (most, value, k) => Math.max(most, Math.abs(value) * (scale[places ? (places[k] as number) : k] as number)),
      0,
    )
  const terms = new Float64Array(space.n)
  if (denominator) {
    const bottom = formAt(denominator, x)
    addGradient(space, numerator, 1 / bottom, terms)
    const down = new Float64Array(space.n)
    addGradient(space, denominator, formAt(numerator, x) / (bottom * bottom), down)
    for (let q = 0; q < space.n; q++) terms[q] = Math.abs(terms[q] as number) + Math.abs(down[q] as number)
  } else addGradient(space, numerator, 1, terms)
  return size(onFree(ties, g), ties.free) <= HOLDS * size(terms)
}
