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
  const amplification = amplifier(model, settled)
  const found: Solution['amplification'] = []
  forEachCell(model, ({ slot, measure }) => {
    if (cells.states[slot] !== CellState.solvable) return
    const factor = amplification(measure, cells.values[slot] as number)
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
export function amplifier(model: Model, settled: Settled): (measure: Measure, value: number) => number | undefined {
  const { resolved, assembly } = settled
  const { elimination: e, generic } = resolved.knowledge
  const changes = randomChanges(assembly, resolved.knowledge, resolved.blur)
  const tracer = new Tracer(model, assembly, resolved)
  let work = 0
  return (measure, value) => {
    if (value === 0 || (measure.denominator && value === 1)) return undefined
    const { numerator, denominator } = measure
    const size = Math.abs(denominator ? value * dot(denominator, generic.value) : value)
    let factor = 0
    for (const x of changes) {
      const change = dot(numerator, x) - (denominator ? value * dot(denominator, x) : 0)
      factor = Math.max(factor, Math.abs(change) / size)
    }
    if (!(factor > SUSPECT)) return undefined
    const form = sensitive(measure, value)
    work += e.rows.column.length
    if (work <= MOST_WORK) factor = worstGiven(model, tracer, settled, form, size) ?? factor
    return factor > AMPLIFIED ? factor : undefined
  }
}

function dot(form: LinearForm, x: Float64Array): number {
  let sum = 0
  for (let k = 0; k < form.columns.length; k++)
    sum += (form.coefficients[k] as number) * (x[form.columns[k] as number] as number)
  return sum
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
