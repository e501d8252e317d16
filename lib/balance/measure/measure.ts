import type { Model } from '../model'
import { otherPerOwn } from '../model'
import type { ExtraQuantity, Quantity } from '../problem'

/** Sum of coefficient times column, plus a constant. Columns are not repeated. */
export type LinearForm = { columns: number[]; coefficients: number[]; constant: number }

/** One linear form, or the ratio of two: everything that a person reads or types. */
export type Measure = { numerator: LinearForm; denominator?: LinearForm }

export const constantForm = (constant: number): LinearForm => ({ columns: [], coefficients: [], constant })
export const columnForm = (column: number, coefficient = 1): LinearForm =>
  column < 0 ? constantForm(0) : { columns: [column], coefficients: [coefficient], constant: 0 }

/** Coefficients that cancel to this part of their terms are rounding of numbers typed, such as 1 - 0.1 - 0.9. */
const CANCELS = 1e-15

/** a x left + b x right, entries that cancel dropped. */
export function combine(a: number, left: LinearForm, b: number, right: LinearForm): LinearForm {
  const columns = left.columns.slice()
  const coefficients = left.coefficients.map((coefficient) => a * coefficient)
  // Most forms are short, where a plain search beats a map.
  const places = columns.length > 24 ? new Map(columns.map((column, k) => [column, k])) : undefined
  for (let k = 0; k < right.columns.length; k++) {
    const column = right.columns[k] as number
    const term = b * (right.coefficients[k] as number)
    const place = places ? (places.get(column) ?? -1) : columns.indexOf(column)
    if (place < 0) {
      columns.push(column)
      coefficients.push(term)
      continue
    }
    const before = coefficients[place] as number
    const after = before + term
    coefficients[place] = Math.abs(after) <= CANCELS * (Math.abs(before) + Math.abs(term)) ? 0 : after
  }
  let kept = 0
  for (let k = 0; k < columns.length; k++) {
    if (coefficients[k] === 0) continue
    columns[kept] = columns[k] as number
    coefficients[kept++] = coefficients[k] as number
  }
  columns.length = kept
  coefficients.length = kept
  return { columns, coefficients, constant: a * left.constant + b * right.constant }
}

export const isConstant = (form: LinearForm): boolean => form.columns.length === 0

export const total = (model: Model, stream: number): LinearForm => columnForm(model.totalColumn[stream] as number)

export const part = (model: Model, stream: number, component: number): LinearForm =>
  columnForm(model.flowColumn[stream * model.nComponents + component] as number)

/** Flow of one component on the other basis. */
export const otherPart = (model: Model, stream: number, component: number): LinearForm =>
  columnForm(model.flowColumn[stream * model.nComponents + component] as number, otherPerOwn(model, component))

/** Total on the other basis: its own column where one was made, else the sum over the components. */
export function otherTotal(model: Model, stream: number): LinearForm {
  const column = model.otherTotalColumn[stream] as number
  return column >= 0 ? columnForm(column) : otherSum(model, stream)
}

/** Total on the other basis written out in component flows. */
export function otherSum(model: Model, stream: number): LinearForm {
  const list = model.present[stream] as number[]
  return {
    columns: list.map((c) => model.flowColumn[stream * model.nComponents + c] as number),
    coefficients: list.map((c) => otherPerOwn(model, c)),
    constant: 0,
  }
}

/** Volume per time (m3) by the stream's density: mass over density. */
function volume(model: Model, stream: number): LinearForm {
  const density = model.problem.streams[stream]?.density as number
  const mass = model.problem.basis === 'mass' ? total(model, stream) : otherTotal(model, stream)
  return combine(model.units.mass.factor / density, mass, 0, constantForm(0))
}

type PlainQuantity = Exclude<Quantity, ExtraQuantity>

/**
 * The measure that a plain quantity of a stream stands for; flows in the units of `model.units`, fractions of 1. Each is made
 * once for a model, and never changed.
 */
export function measureOf(model: Model, quantity: PlainQuantity, stream: number, component: number): Measure {
  const place = stream * (model.nComponents + 1) + component + 1
  let its = model.measures.get(quantity)
  if (!its) {
    its = new Map()
    model.measures.set(quantity, its)
  }
  let measure = its.get(place)
  if (!measure) {
    measure = makeMeasure(model, quantity, stream, component)
    its.set(place, measure)
  }
  return measure
}

function makeMeasure(model: Model, quantity: PlainQuantity, stream: number, component: number): Measure {
  const own = model.problem.basis
  switch (quantity) {
    case 'flow':
      return { numerator: total(model, stream) }
    case 'componentFlow':
      return { numerator: part(model, stream, component) }
    case 'massFlow':
      return { numerator: own === 'mass' ? total(model, stream) : otherTotal(model, stream) }
    case 'moleFlow':
      return { numerator: own === 'mole' ? total(model, stream) : otherTotal(model, stream) }
    case 'componentMassFlow':
      return { numerator: own === 'mass' ? part(model, stream, component) : otherPart(model, stream, component) }
    case 'componentMoleFlow':
      return { numerator: own === 'mole' ? part(model, stream, component) : otherPart(model, stream, component) }
    case 'volumeFlow':
      return { numerator: volume(model, stream) }
    case 'massFraction':
      return own === 'mass' ? share(model, stream, component) : otherShare(model, stream, component)
    case 'moleFraction':
      return own === 'mole' ? share(model, stream, component) : otherShare(model, stream, component)
  }
}

export const share = (model: Model, stream: number, component: number): Measure => ({
  numerator: part(model, stream, component),
  denominator: total(model, stream),
})

export const otherShare = (model: Model, stream: number, component: number): Measure => ({
  numerator: otherPart(model, stream, component),
  denominator: otherTotal(model, stream),
})
