import type { LinearForm } from '../measure/measure'
import { MOVES, type Vector } from '../sparse/solve'

/** Digits lost in a difference count from here: a size that stands for a thousandth of a term. */
export const LOST = 1e-3
/** A denominator below this part of its terms is no flow at all. */
const ZERO_DENOMINATOR = 1e-9
/** A value below this part of its terms is 0. */
const ZERO = 1e-11

/** The points and directions in which forms are read: generic solution, particular solution, then the probes. */
export type Places = readonly Vector[]
const GENERIC = 0
const PARTICULAR = 1
const PROBES = 2

/** Value of a form at each place, and the terms to hold it against. In the probes its constant is left out. */
export type FormValues = { value: Float64Array; terms: Float64Array }

export const formValues = (places: Places): FormValues => ({
  value: new Float64Array(places.length),
  terms: new Float64Array(places.length),
})

/** Reads a form at every place; the terms are those of the sum, or what its unknowns were made of where they have lost digits. */
export function readForm(out: FormValues, { columns, coefficients, constant }: LinearForm, places: Places): void {
  for (let p = 0; p < places.length; p++) {
    const { value: x, size } = places[p] as Vector
    let value = p < PROBES ? constant : 0
    let terms = Math.abs(value)
    let made = 0
    for (let k = 0; k < columns.length; k++) {
      const a = coefficients[k] as number
      const j = columns[k] as number
      const term = a * (x[j] as number)
      value += term
      terms += Math.abs(term)
      made = Math.max(made, Math.abs(a) * (size[j] as number))
    }
    out.value[p] = value
    out.terms[p] = Math.max(terms, LOST * made)
  }
}

/** The same for one column times a coefficient; a column of -1 is 0. */
export function readColumn(out: FormValues, column: number, coefficient: number, places: Places): void {
  for (let p = 0; p < places.length; p++) {
    const { value: x, size } = places[p] as Vector
    const value = column < 0 ? 0 : coefficient * (x[column] as number)
    const made = column < 0 ? 0 : LOST * Math.abs(coefficient) * (size[column] as number)
    out.value[p] = value
    out.terms[p] = Math.max(Math.abs(value), made)
  }
}

/** The value of a form where it is the same in every solution, else NaN. */
export function fixedIn({ value, terms }: FormValues): number {
  for (let p = PROBES; p < value.length; p++)
    if (Math.abs(value[p] as number) > MOVES * (terms[p] as number)) return Number.NaN
  const own = value[PARTICULAR] as number
  return Math.abs(own) <= ZERO * (terms[PARTICULAR] as number) ? 0 : own
}

/** The ratio of two forms where it is the same in every solution, else NaN. The ratio to a flow of 0 is unknown. */
export function ratioIn(top: FormValues, bottom: FormValues): number {
  const below = bottom.value[GENERIC] as number
  if (Math.abs(below) <= ZERO_DENOMINATOR * (bottom.terms[GENERIC] as number) || below === 0) return Number.NaN
  const above = top.value[GENERIC] as number
  const ratio = Math.abs(above) <= ZERO * (top.terms[GENERIC] as number) ? 0 : above / below
  // The generic point holds the first probe, so that a particular solution off the ray shows in that probe.
  for (let p = PROBES; p < top.value.length; p++) {
    const gap = (top.value[p] as number) - ratio * (bottom.value[p] as number)
    const terms = (top.terms[p] as number) + Math.abs(ratio) * (bottom.terms[p] as number)
    if (Math.abs(gap) > MOVES * terms) return Number.NaN
  }
  return ratio
}
