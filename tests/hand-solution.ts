import { typedValue } from '@/lib/balance/measure/typed-value'
import { buildModel, hasOtherBasis, otherPerOwn } from '@/lib/balance/model'
import type { Problem, Quantity } from '@/lib/balance/problem'
import { type CellQuantity, CellState, type Solution, slotOf, slotsPerStream } from '@/lib/balance/solution'

/** Component flows by stream and component; a stream that is left out is still unknown. */
export type HandFlows = Record<string, Record<string, number>>

const ownQuantities: Partial<Record<Quantity, CellQuantity>> = { flow: 'flow', componentFlow: 'componentFlow' }

/**
 * A solution made by hand from component flows, without the solver: every cell of a stream with flows is solvable, or given
 * where the problem says so. It shows what a writer makes of numbers that the test knows.
 */
export function handSolution(problem: Problem, flows: HandFlows, extents: Record<string, number> = {}): Solution {
  const model = buildModel(problem)
  if (!model) throw new Error('The flow unit does not fit the basis')
  const n = problem.components.length
  const size = problem.streams.length * slotsPerStream(n)
  const states = new Uint8Array(size)
  const values = new Float64Array(size).fill(Number.NaN)
  problem.streams.forEach(({ id }, s) => {
    const present = model.present[s] as number[]
    const known = flows[id]
    const part = (c: number): number => known?.[problem.components[c]?.id ?? ''] ?? 0
    const total = present.reduce((sum, c) => sum + part(c), 0)
    const put = (quantity: CellQuantity, c: number, value: number): void => {
      const slot = slotOf(n, s, quantity, c)
      states[slot] = known ? CellState.solvable : CellState.unknown
      if (known) values[slot] = value
    }
    put('flow', 0, total)
    for (const c of present) {
      put('componentFlow', c, part(c))
      put('fraction', c, part(c) / total)
    }
    if (!hasOtherBasis(model, s)) return
    const otherTotal = present.reduce((sum, c) => sum + part(c) * otherPerOwn(model, c), 0)
    put('otherFlow', 0, otherTotal)
    for (const c of present) {
      put('otherComponentFlow', c, part(c) * otherPerOwn(model, c))
      put('otherFraction', c, (part(c) * otherPerOwn(model, c)) / otherTotal)
    }
  })
  const quantities = { ...ownQuantities, [`${problem.basis}Fraction`]: 'fraction' as const }
  for (const given of problem.givens ?? []) {
    const { stream, quantity, component } = given
    const own = quantities[quantity]
    const s = model.streamIndex.get(stream)
    if (own === undefined || s === undefined) continue
    const slot = slotOf(n, s, own, component === undefined ? 0 : model.componentIndex.get(component))
    states[slot] = CellState.given
    values[slot] = typedValue(model, given).value
  }
  const count = (state: CellState): number => states.filter((one) => one === state).length
  const unknown = count(CellState.unknown)
  return {
    status: unknown > 0 ? 'open' : 'solved',
    summary: {
      given: count(CellState.given),
      solvable: count(CellState.solvable),
      unknown,
      atOdds: 0,
      degreesOfFreedom: unknown > 0 ? 1 : 0,
      extentFreedom: 0,
      freeScale: [],
    },
    nStreams: problem.streams.length,
    nComponents: n,
    states,
    values,
    flags: new Uint8Array(size),
    amplification: [],
    blockedBy: [],
    extents: (problem.reactions ?? []).map(({ id }) => {
      const value = extents[id]
      return value === undefined ? { reaction: id, state: 'unknown' } : { reaction: id, state: 'solvable', value }
    }),
    conflicts: [],
    diagnostics: [],
  }
}
