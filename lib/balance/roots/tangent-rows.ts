import type { LinearForm } from '../measure/measure'
import type { Block } from './blocks'
import { reduce } from './dense'
import { evaluateExpression, overColumns } from './equations'

/** A row that is 0 at a solution and, to first order, along all solutions near it. */
export type TangentRow = { source: number; form: LinearForm }

/** Entries of a gradient below this part of its terms are rounding. */
const NOTHING = 1e-12

/** Change of a form along each direction. */
export function along({ columns, coefficients }: LinearForm, directions: readonly Float64Array[]): Float64Array {
  return Float64Array.from(directions, (h) => {
    let sum = 0
    for (let k = 0; k < columns.length; k++) sum += (coefficients[k] as number) * (h[columns[k] as number] as number)
    return sum
  })
}

/** Independent tangent rows of a block's equations at a solution x; undefined where their rank is unsure. */
export function tangentRows(
  { equations }: Block,
  directions: readonly Float64Array[],
  x: Float64Array,
): TangentRow[] | undefined {
  const calculus = overColumns(x)
  const all = equations.map(({ source, equation }) => ({ source, ...evaluateExpression(equation, calculus) }))
  const matrix = all.map(({ gradient, terms }) =>
    [...along(gradient, directions)].map((value) => (Math.abs(value) < NOTHING * terms ? 0 : value / (terms || 1))),
  )
  const { pivotRows, sure } = reduce(matrix, directions.length)
  if (!sure) return undefined
  return pivotRows.map((i) => {
    const { source, gradient, terms } = all[i] as (typeof all)[number]
    const { columns } = gradient
    const coefficients = gradient.coefficients.map((value) => value / terms)
    const constant = -columns.reduce((sum, j, k) => sum + (coefficients[k] as number) * (x[j] as number), 0)
    return { source, form: { columns, coefficients, constant } }
  })
}
