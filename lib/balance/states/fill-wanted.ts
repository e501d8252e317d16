import type { Settled } from '../conflicts/find-conflicts'
import { measureKey } from '../measure/measure-name'
import { namedMeasure } from '../measure/named-measure'
import type { Model } from '../model'
import type { MeasureName } from '../problem'
import type { Roots } from '../roots/find-roots'
import { knownWithRoots } from '../roots/root-cells'
import { CellFlag, CellState, type Solution, slotOf, type WantedMeasures } from '../solution'
import { amplifier, BLURRED } from './amplification'
import { inDisplayOrder } from './fill-cells'

/** Values below this part of 1 are rounding, not negative. */
const ROUNDING = 1e-11

/**
 * States, values and flags of each wanted measure in each stream, by the same rules as cells: a given in use that names
 * the measure shows what was typed; what is too blurred to be known is unknown.
 */
export function fillWanted(
  model: Model,
  settled: Settled,
  cells: Pick<Solution, 'values'>,
  wanted: readonly MeasureName[],
  roots?: Roots,
): WantedMeasures {
  const length = wanted.length * model.nStreams
  const states = new Uint8Array(length)
  const values = new Float64Array(length).fill(Number.NaN)
  const flags = new Uint8Array(length)
  const amplification = amplifier(model, roots?.near ?? settled)
  const { knowledge } = settled.resolved
  const rowOf = new Map(wanted.map((name, row) => [measureKey(name), row]))
  wanted.forEach((name, row) => {
    for (let stream = 0; stream < model.nStreams; stream++) {
      const at = row * model.nStreams + stream
      const measure = namedMeasure(model, stream, name)
      if (!measure) continue
      states[at] = CellState.unknown
      const known = isWhole(measure) ? { value: 1, isLocal: false } : knownWithRoots(knowledge, roots, measure)
      const value = known?.value
      const factor = value === undefined ? undefined : amplification(measure, value)
      if (factor !== undefined) flags[at]! |= CellFlag.amplified
      if (value === undefined || (factor ?? 0) > BLURRED) continue
      states[at] = CellState.solvable
      values[at] = value
      if (known?.isLocal) flags[at]! |= CellFlag.localOnly
    }
  })
  for (const { given, stream, index, typed } of inDisplayOrder(settled.assembly.givens)) {
    const row = rowOf.get(measureKey(given))
    const at = (row ?? 0) * model.nStreams + stream
    if (row === undefined || states[at] === CellState.absent) continue
    if (states[at] !== CellState.atOdds) states[at] = settled.atOdds.has(index) ? CellState.atOdds : CellState.given
    values[at] = typed
  }
  wanted.forEach(({ quantity, component, without }, row) => {
    const upToOne = quantity.endsWith('Fraction') && !without?.includes(component ?? '')
    for (let stream = 0; stream < model.nStreams; stream++) {
      const at = row * model.nStreams + stream
      if (states[at] === CellState.absent) continue
      const value = values[at] as number
      const flow = cells.values[slotOf(model.nComponents, stream, 'flow')]
      if (value < -ROUNDING * (quantity.endsWith('Flow') ? Math.abs(flow ?? 0) : 1)) flags[at]! |= CellFlag.negative
      if (upToOne && value > 1 + ROUNDING) flags[at]! |= CellFlag.aboveOne
      if (flow === 0) flags[at]! |= CellFlag.zeroFlow
    }
  })
  return { states, values, flags }
}

/** A part over the same part, which is 1 whatever flows. */
const isWhole = ({ numerator, denominator }: NonNullable<ReturnType<typeof namedMeasure>>): boolean =>
  denominator !== undefined &&
  numerator.columns.length === denominator.columns.length &&
  numerator.columns.every(
    (column, k) => column === denominator.columns[k] && numerator.coefficients[k] === denominator.coefficients[k],
  )
