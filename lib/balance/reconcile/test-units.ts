import type { Reading } from '../estimate/readings'
import { total } from '../measure/measure'
import { unitFactor } from '../measure/typed-value'
import type { Model, UnitModel } from '../model'
import { isBalanced } from '../rows/balances'
import { fixedValue, type Knowledge } from '../states/knowledge'
import type { Reconciliation } from './reconciliation'

/**
 * Total imbalance of each unit by raw readings (in less out less what it gains), over its standard deviation (nodal
 * test; Reilly and Carpani, 1963). Only units of which every crossing flow is read or known exactly.
 */
export function testUnits(model: Model, knowledge: Knowledge, readings: readonly Reading[]): Reconciliation['units'] {
  const flows = new Map<number, Reading>()
  for (const reading of readings) {
    const { numerator, denominator } = reading.measure
    const column = model.totalColumn[reading.stream] as number
    if (denominator || numerator.columns.length !== 1 || numerator.columns[0] !== column) continue
    const before = flows.get(reading.stream)
    if (!before || before.given.instrument !== undefined) flows.set(reading.stream, reading)
  }
  const found: Reconciliation['units'] = []
  model.plant.forEach((unit, index) => {
    if (!isBalanced(model, index) || !keepsTotal(model, unit)) return
    let imbalance = 0 - totalGain(model, index)
    let variance = 0
    for (const [streams, sign] of [
      [unit.inlets, 1],
      [unit.outlets, -1],
    ] as const)
      for (const s of streams) {
        const reading = flows.get(s)
        if (reading) {
          const factor = reading.measure.numerator.coefficients[0] as number
          imbalance += (sign * reading.value) / factor
          variance += (reading.sigma / factor) ** 2
          continue
        }
        const exact = fixedValue(knowledge, total(model, s))
        if (exact === undefined) return
        imbalance += sign * exact
      }
    if (variance > 0) found.push({ unit: unit.id, imbalance, standardised: imbalance / Math.sqrt(variance) })
  })
  return found
}

/** True where what enters in total is what leaves: always by mass, by moles where nothing reacts. */
const keepsTotal = (model: Model, unit: UnitModel): boolean =>
  model.problem.basis === 'mass' || (unit.reactions.length === 0 && !unit.byElements)

function totalGain(model: Model, unit: number): number {
  const list = model.problem.units[unit]?.inventory ?? []
  const whole = list.filter(({ component }) => component === undefined)
  const gains = whole.length > 0 ? whole : list
  return gains.reduce((sum, { value, unit: text }) => sum + value * unitFactor(model, 'flow', text), 0)
}
