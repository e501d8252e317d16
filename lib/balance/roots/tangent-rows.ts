import type { LinearForm } from '../measure/measure'
import type { Model } from '../model'
import type { Block } from './blocks'
import { reduce } from './dense'
import { equationsOf } from './equations'

/** A row that is 0 at a solution and, to first order, along all solutions near it. */
export type TangentRow = { source: number; form: LinearForm }

/** Entries of a gradient below this part of its terms are rounding. */
const NOTHING = 1e-12

/** Change of a form along each direction, over a size. */
export function along(
  { columns, coefficients }: LinearForm,
  directions: readonly Float64Array[],
  by: number,
): Float64Array {
  return Float64Array.from(directions, (h) => {
    let sum = 0
    for (let k = 0; k < columns.length; k++) sum += (coefficients[k] as number) * (h[columns[k] as number] as number)
    return sum / by
  })
}

/** Independent tangent rows of a block's equations at a solution x; undefined where their rank is unsure. */
export function tangentRows(
  model: Model,
  { items }: Pick<Block, 'items'>,
  directions: readonly Float64Array[],
  x: Float64Array,
): TangentRow[] | undefined {
  const all = items.flatMap((item) =>
    equationsOf(model, item, x).map((equation) => ({ source: item.source, equation })),
  )
  const matrix = all.map(({ equation }) =>
    [...along(equation.gradient, directions, equation.terms || 1)].map((value) =>
      Math.abs(value) < NOTHING ? 0 : value,
    ),
  )
  const { pivotRows, sure } = reduce(matrix, directions.length)
  if (!sure) return undefined
  return pivotRows.map((i) => {
    const { source, equation } = all[i] as (typeof all)[number]
    const { columns, coefficients } = equation.gradient
    const constant = -columns.reduce((sum, j, k) => sum + (coefficients[k] as number) * (x[j] as number), 0)
    return { source, form: { columns, coefficients, constant } }
  })
}
