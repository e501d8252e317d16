import { Tracer } from '../conflicts/circuit'
import type { Settled } from '../conflicts/find-conflicts'
import { combine, constantForm, type LinearForm, type Measure } from '../measure/measure'
import { typedValue } from '../measure/typed-value'
import type { Model } from '../model'
import type { Given } from '../problem'
import { fixedRuleValue } from '../rows/assemble'
import { CellFlag, CellState, type Solution } from '../solution'
import { forEachCell } from './cells'
import type { CellArrays } from './fill-cells'
import { randomChanges } from './random-change'

/** Relative change of a cell per relative change of its worst given from which it is flagged. */
export const AMPLIFIED = 1e4
/** From here the half-width that every value has at least moves a cell by more than itself: it is not known. */
export const BLURRED = 1e9
/** A quick estimate above this is looked at exactly. */
const SUSPECT = 5e3
/** Row entries times cells that may be spent on exact figures; beyond, the estimate stands. */
const MOST_WORK = 1e7

/**
 * Finds cells that a small change of one typed value moves much. All typed values are changed at once, at random, to
 * find suspects; the worst given of each suspect comes from the multipliers with which it rests on the rows. Cells
 * beyond `BLURRED` lose their value and become unknown, in place.
 */
export function findAmplified(model: Model, settled: Settled, cells: CellArrays): Solution['amplification'] {
  const changes = changesOf(settled)
  const amplification = amplifier(model, settled, changes)
  const found: Solution['amplification'] = []
  // Each column at the generic solution and under the two changes; the totals of a stream come before what rests on them.
  const points = [settled.resolved.knowledge.generic.value, ...changes]
  const own = new Float64Array(points.length)
  const total = new Float64Array(points.length)
  const otherTotal = new Float64Array(points.length)
  forEachCell(model, (cell) => {
    const { slot, quantity, isFraction } = cell
    if (quantity === 'flow') readAt(total, points, cell.column, 1)
    else if (quantity === 'otherFlow') readSumAt(otherTotal, points, cell.measure.numerator)
    else readAt(own, points, cell.column, cell.coefficient)
    if (cells.states[slot] !== CellState.solvable) return
    const value = cells.values[slot] as number
    const top = quantity === 'flow' ? total : quantity === 'otherFlow' ? otherTotal : own
    const bottom = isFraction ? (quantity === 'fraction' ? total : otherTotal) : undefined
    if (!(moveOf(value, top, bottom) > SUSPECT)) return
    const factor = amplification(cell.measure, value)
    if (factor === undefined) return
    found.push([slot, factor])
    cells.flags[slot]! |= CellFlag.amplified
    if (factor <= BLURRED) return
    cells.states[slot] = CellState.unknown
    cells.values[slot] = Number.NaN
  })
  return found
}

/** Says of a measure at its value by how much its worst given moves it; undefined up to `AMPLIFIED`. */
export function amplifier(
  model: Model,
  settled: Settled,
  changes = changesOf(settled),
): (measure: Measure, value: number) => number | undefined {
  const { resolved, assembly } = settled
  const { elimination: e, generic } = resolved.knowledge
  const tracer = new Tracer(model, assembly, resolved)
  const points = [generic.value, ...changes]
  const top = new Float64Array(points.length)
  const bottom = new Float64Array(points.length)
  let work = 0
  return (measure, value) => {
    if (value === 0 || (measure.denominator && value === 1)) return undefined
    readSumAt(top, points, measure.numerator)
    if (measure.denominator) readSumAt(bottom, points, measure.denominator)
    let factor = moveOf(value, top, measure.denominator && bottom)
    if (!(factor > SUSPECT)) return undefined
    const form = sensitive(measure, value)
    const size = Math.abs(measure.denominator ? value * (bottom[0] as number) : value)
    work += e.rows.column.length
    if (work <= MOST_WORK) factor = worstGiven(model, tracer, settled, form, size) ?? factor
    return factor > AMPLIFIED ? factor : undefined
  }
}

const changesOf = ({ resolved, assembly }: Settled): Float64Array[] =>
  randomChanges(assembly, resolved.knowledge, resolved.blur)

/** Largest change of a measure beside its value; the first entry of `top` and `bottom` is at the generic solution, the others are changes. */
function moveOf(value: number, top: Float64Array, bottom: Float64Array | undefined): number {
  const size = Math.abs(bottom ? value * (bottom[0] as number) : value)
  let most = 0
  for (let p = 1; p < top.length; p++) {
    const change = (top[p] as number) - (bottom ? value * (bottom[p] as number) : 0)
    most = Math.max(most, Math.abs(change) / size)
  }
  return most
}

/** One column times a coefficient at every point; a column of -1 is 0. */
function readAt(out: Float64Array, points: readonly Float64Array[], column: number, coefficient: number): void {
  for (let p = 0; p < points.length; p++)
    out[p] = column < 0 ? 0 : coefficient * ((points[p] as Float64Array)[column] as number)
}

function readSumAt(out: Float64Array, points: readonly Float64Array[], { columns, coefficients }: LinearForm): void {
  out.fill(0)
  for (let k = 0; k < columns.length; k++)
    for (let p = 0; p < points.length; p++)
      out[p]! += (coefficients[k] as number) * ((points[p] as Float64Array)[columns[k] as number] as number)
}

const sensitive = ({ numerator, denominator }: Measure, value: number) =>
  denominator ? combine(1, numerator, -value, denominator) : combine(1, numerator, 0, constantForm(0))

function worstGiven(
  model: Model,
  tracer: Tracer,
  { resolved }: Settled,
  form: ReturnType<typeof sensitive>,
  size: number,
): number | undefined {
  const circuit = tracer.ofForm(resolved.knowledge.elimination, form)
  if (!circuit) return undefined
  const nGivens = model.problem.givens?.length ?? 0
  let worst = 0
  for (const [member, weight] of circuit.weight) {
    const rule = model.problem.relations?.[member - nGivens]
    const value =
      member < nGivens
        ? typedValue(model, (model.problem.givens as Given[])[member] as Given).value
        : rule && 'value' in rule
          ? (fixedRuleValue(model, rule.value) ?? 0)
          : 1
    worst = Math.max(worst, Math.abs(weight * value) / size)
  }
  return worst
}
