import type { Model } from '../model'
import type { Given, Problem } from '../problem'
import type { Place } from '../solution'
import { type KeptCell, quantityOfCell } from '../states/cells'
import type { Signature } from './signatures'

export type Cannot = {
  places?: readonly Place[]
  flows?: readonly string[]
  analyses?: readonly string[]
  components?: readonly string[]
}

/** A value, or a set of values, to measure: cells that it would settle and unknown cells that it would leave. */
export type MeasureNext = { set: Place[]; settles: number; leaves: number }

/** A flow is read from a meter, a fraction needs an analysis, a component's flow needs both. */
export function measurableFirst(its: readonly Signature[]): Signature[] {
  const rank = { flow: 0, fraction: 1, componentFlow: 2 } as Record<string, number>
  return [...its].sort((a, b) => (rank[a.cell.quantity] as number) - (rank[b.cell.quantity] as number))
}

export function placeOf(model: Model, { stream, component, quantity }: KeptCell): Place {
  const { streams, components } = model.problem
  return {
    stream: streams[stream]?.id as string,
    quantity: quantityOfCell(model, quantity),
    ...(component >= 0 && { component: components[component]?.id as string }),
  }
}

export const givenAt = (model: Model, { cell, value }: Signature): Given => ({ ...placeOf(model, cell), value })

export const withGivens = (problem: Problem, givens: readonly Given[]): Problem => ({
  ...problem,
  givens: [...(problem.givens ?? []), ...givens],
})

/** Whether a cell may be asked for. A component's flow is read as an analysis and a flow together. */
export function isAllowed(model: Model, cannot: Cannot = {}): (signature: Signature) => boolean {
  const key = ({ stream, quantity, component = '' }: Place): string => JSON.stringify([stream, quantity, component])
  const places = new Set(cannot.places?.map(key))
  const flows = new Set(cannot.flows)
  const analyses = new Set(cannot.analyses)
  const components = new Set(cannot.components)
  return ({ cell }) => {
    const place = placeOf(model, cell)
    if (places.has(key(place))) return false
    if (cell.quantity !== 'fraction' && flows.has(place.stream)) return false
    if (place.component === undefined) return true
    return !analyses.has(place.stream) && !components.has(place.component)
  }
}
