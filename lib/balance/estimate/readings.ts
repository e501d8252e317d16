import type { LinearForm, Measure } from '../measure/measure'
import { namedMeasure } from '../measure/named-measure'
import { unitFactor } from '../measure/typed-value'
import type { Model } from '../model'
import type { Given } from '../problem'
import { givensInUse } from '../rows/givens'

/** A given with a standard deviation: one row of the estimate. */
export type Reading = {
  /** Index among the problem's givens. */
  index: number
  given: Given
  stream: number
  /** -1 for a total. */
  component: number
  measure: Measure
  /** In the book's units, fractions of 1. */
  value: number
  sigma: number
}

const isReading = (given: Given): boolean => given.sigma !== undefined && (given.use ?? 'given') === 'given'

/**
 * Readings of a problem, in the order of typing, with the person's choice on fractions that do not add up applied: a
 * component by difference is no reading, scaled fractions carry their standard deviation along.
 */
export function readingsOf(model: Model): Reading[] {
  return givensInUse(model).givens.flatMap(({ index, given, stream, component, typed, value }): Reading[] => {
    const measure = isReading(given) ? namedMeasure(model, stream, given) : undefined
    if (!measure) return []
    const factor = unitFactor(model, given.quantity, given.unit)
    const scaled = model.problem.streams[stream]?.fractions === 'scale' && typed !== 0 ? value / typed : 1
    return [
      {
        index,
        given,
        stream,
        component,
        measure,
        value: typed * scaled,
        sigma: (given.sigma as number) * factor * scaled,
      },
    ]
  })
}

/** The problem without its readings: what holds exactly. */
export const withoutReadings = (model: Model): Model => ({
  ...model,
  problem: {
    ...model.problem,
    givens: model.problem.givens?.map((given) => (isReading(given) ? { ...given, use: 'withdrawn' as const } : given)),
  },
})

/** Value of a form at x. */
export function formAt(form: LinearForm, x: Float64Array): number {
  let sum = form.constant
  for (let k = 0; k < form.columns.length; k++)
    sum += (form.coefficients[k] as number) * (x[form.columns[k] as number] as number)
  return sum
}

/** Value of a measure at x; NaN where its denominator is 0. */
export function measureAt({ numerator, denominator }: Measure, x: Float64Array): number {
  const top = formAt(numerator, x)
  if (!denominator) return top
  const bottom = formAt(denominator, x)
  return bottom === 0 ? Number.NaN : top / bottom
}
