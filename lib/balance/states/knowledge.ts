import type { LinearForm, Measure } from '../measure/measure'
import { seededRandom } from '../random'
import type { Elimination } from '../sparse/elimination'
import { MOVES, probe, solveParticular, type Vector } from '../sparse/solve'

const PROBES = 3
const SEED = 20_240_611
/** A denominator below this part of its terms is no flow at all. */
const ZERO_DENOMINATOR = 1e-9

/**
 * What the rows say: one generic solution and independent directions in which they leave it free. Everything else is a
 * question put to these: a measure is known when it is the same along all of them.
 */
export type Knowledge = {
  elimination: Elimination
  /** Particular solution plus the first probe. */
  generic: Vector
  particular: Vector
  /** Empty where nothing is free. */
  probes: Vector[]
  random: () => number
}

export function gatherKnowledge(elimination: Elimination): Knowledge {
  const random = seededRandom(SEED)
  const particular = solveParticular(elimination)
  const scale = typicalSize(elimination)
  const probes: Vector[] = []
  if (elimination.free.length > 0) for (let q = 0; q < PROBES; q++) probes.push(probe(elimination, random, scale))
  const [first] = probes
  return { elimination, generic: first ? moved(particular, 1, first) : particular, particular, probes, random }
}

/** One more direction, for questions that three do not settle. */
export function addProbe(knowledge: Knowledge): Vector {
  const direction = probe(knowledge.elimination, knowledge.random, typicalSize(knowledge.elimination))
  knowledge.probes.push(direction)
  return direction
}

/** A point moved along a direction. */
export function moved(point: Vector, factor: number, direction: Vector): Vector {
  return {
    value: point.value.map((value, j) => value + factor * (direction.value[j] as number)),
    size: point.size.map((size, j) => Math.max(size, Math.abs(factor) * (direction.size[j] as number))),
  }
}

/** Geometric mean of what the rows hold on the right, so that probes are of the size of the flows. */
function typicalSize({ rows }: Elimination): number {
  let sum = 0
  let count = 0
  for (const value of rows.rhs)
    if (value !== 0) {
      sum += Math.log(Math.abs(value))
      count++
    }
  return count === 0 ? 1 : Math.exp(sum / count)
}

/** Digits lost in a difference count from here: a size that stands for a thousandth of a term. */
export const LOST = 1e-3

/**
 * Value of a form at a point and the terms to hold it against: those of the sum, or what its unknowns were made of where
 * they have lost digits. A direction leaves the constant out.
 */
export function evaluate(
  form: LinearForm,
  { value: x, size }: Vector,
  direction = false,
): { value: number; terms: number } {
  let value = direction ? 0 : form.constant
  let terms = Math.abs(value)
  let made = 0
  for (let k = 0; k < form.columns.length; k++) {
    const a = form.coefficients[k] as number
    const j = form.columns[k] as number
    const term = a * (x[j] as number)
    value += term
    terms += Math.abs(term)
    made = Math.max(made, Math.abs(a) * (size[j] as number))
  }
  return { value, terms: Math.max(terms, LOST * made) }
}

/** The value of a form where it is the same in every solution, else undefined. */
export function fixedValue(knowledge: Knowledge, form: LinearForm): number | undefined {
  for (const direction of knowledge.probes) {
    const { value, terms } = evaluate(form, direction, true)
    if (Math.abs(value) > MOVES * terms) return undefined
  }
  const { value, terms } = evaluate(form, knowledge.particular)
  return Math.abs(value) <= 1e-11 * terms ? 0 : value
}

/** The value of a measure where every solution gives the same, else undefined. The ratio to a flow of 0 is unknown. */
export function knownMeasure(knowledge: Knowledge, measure: Measure): number | undefined {
  const { numerator, denominator } = measure
  if (!denominator) return fixedValue(knowledge, numerator)
  const at = evaluate(denominator, knowledge.generic)
  if (Math.abs(at.value) <= ZERO_DENOMINATOR * at.terms || at.value === 0) return undefined
  const top = evaluate(numerator, knowledge.generic)
  const ratio = Math.abs(top.value) <= 1e-11 * top.terms ? 0 : top.value / at.value
  // The generic point holds the first probe, so that a particular solution off the ray shows in that probe.
  for (const direction of knowledge.probes) {
    const up = evaluate(numerator, direction, true)
    const down = evaluate(denominator, direction, true)
    if (Math.abs(up.value - ratio * down.value) > MOVES * (up.terms + Math.abs(ratio) * down.terms)) return undefined
  }
  return ratio
}
