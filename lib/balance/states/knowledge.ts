import type { LinearForm, Measure } from '../measure/measure'
import { seededRandom } from '../random'
import type { Elimination } from '../sparse/elimination'
import { probe, solveParticular, type Vector } from '../sparse/solve'
import { type FormValues, fixedIn, formValues, LOST, type Places, ratioIn, readForm } from './form-values'

const PROBES = 3
const SEED = 20_240_611

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

/** Where forms are read to see what is known. */
export const placesOf = ({ generic, particular, probes }: Knowledge): Places => [generic, particular, ...probes]

function read(form: LinearForm, places: Places): FormValues {
  const values = formValues(places)
  readForm(values, form, places)
  return values
}

/** The value of a form where it is the same in every solution, else undefined. */
export function fixedValue(knowledge: Knowledge, form: LinearForm): number | undefined {
  const value = fixedIn(read(form, placesOf(knowledge)))
  return Number.isNaN(value) ? undefined : value
}

/** The value of a measure where every solution gives the same, else undefined. The ratio to a flow of 0 is unknown. */
export function knownMeasure(knowledge: Knowledge, { numerator, denominator }: Measure): number | undefined {
  if (!denominator) return fixedValue(knowledge, numerator)
  const places = placesOf(knowledge)
  const ratio = ratioIn(read(numerator, places), read(denominator, places))
  return Number.isNaN(ratio) ? undefined : ratio
}
