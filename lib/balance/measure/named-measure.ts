import { elementShare } from '../chemistry/chemical-formula'
import { hasOtherBasis, type Model, otherPerOwn } from '../model'
import type { Basis, MeasureName } from '../problem'
import { columnForm, type LinearForm, type Measure, measureOf, otherPart, otherTotal, part, total } from './measure'

/**
 * The measure of a stream that a name stands for: flows in the units of `model.units`, ratios of 1. Undefined where the
 * stream has none: the component or the whole group cannot be in it, nothing is left to divide by, or a molar mass, a
 * formula or the density is missing.
 */
export function namedMeasure(model: Model, stream: number, name: MeasureName): Measure | undefined {
  const present = model.present[stream] as number[]
  switch (name.quantity) {
    case 'dryMassFraction':
    case 'dryMoleFraction': {
      const component = indexOf(model, name.component)
      const dry = dryPart(model, stream, name)
      return ratio(
        model,
        stream,
        name.quantity === 'dryMassFraction' ? 'mass' : 'mole',
        present.includes(component) ? [component] : [],
        dry,
      )
    }
    case 'groupMassRatio':
    case 'groupMoleRatio':
      return ratio(
        model,
        stream,
        name.quantity === 'groupMassRatio' ? 'mass' : 'mole',
        among(model, present, name.parts),
        name.over ? among(model, present, name.over) : present,
      )
    case 'elementMassFraction':
      return elementAssay(model, stream, name.element ?? '')
    default:
      return plainMeasure(model, stream, name as PlainName)
  }
}

/** Components that can be in the stream and count on its dry basis, ascending. */
export function dryPart(model: Model, stream: number, { without = [] }: MeasureName): number[] {
  const left = new Set(without.map((id) => model.componentIndex.get(id)))
  return (model.present[stream] as number[]).filter((c) => !left.has(c))
}

/** A form in component flows alone: totals written out. */
export function writtenOut(model: Model, stream: number, form: LinearForm): LinearForm {
  const [column] = form.columns
  if (form.columns.length !== 1 || column === undefined) return form
  const list = model.present[stream] as number[]
  if (list.length < 2) return form
  const times = form.coefficients[0] as number
  const own = column === model.totalColumn[stream]
  if (!own && column !== model.otherTotalColumn[stream]) return form
  return {
    columns: list.map((c) => model.flowColumn[stream * model.nComponents + c] as number),
    coefficients: list.map((c) => times * (own ? 1 : otherPerOwn(model, c))),
    constant: form.constant,
  }
}

type PlainName = MeasureName & { quantity: Parameters<typeof measureOf>[1] }

function plainMeasure(model: Model, stream: number, { quantity, component }: PlainName): Measure | undefined {
  const list = model.present[stream] as number[]
  const c = component === undefined ? -1 : indexOf(model, component)
  if (list.length === 0 || (component !== undefined && !list.includes(c))) return undefined
  const own = model.problem.basis
  const other = own === 'mass' ? 'mole' : 'mass'
  const volume = quantity === 'volumeFlow'
  if (volume && model.problem.streams[stream]?.density === undefined) return undefined
  const crosses = (volume && own === 'mole') || quantity.toLowerCase().includes(other)
  const ofOne = quantity === 'componentMassFlow' || quantity === 'componentMoleFlow'
  if (crosses && !(ofOne ? hasMass(model, c) : hasOtherBasis(model, stream))) return undefined
  return measureOf(model, quantity, stream, c)
}

const indexOf = (model: Model, id: string | undefined): number => model.componentIndex.get(id ?? '') ?? -1

const among = (model: Model, present: readonly number[], ids: readonly string[] = []): number[] => {
  const wanted = new Set(ids.map((id) => model.componentIndex.get(id)))
  return present.filter((c) => wanted.has(c))
}

const hasMass = (model: Model, component: number): boolean => Number.isFinite(model.molarMass[component])

function ratio(model: Model, stream: number, basis: Basis, top: number[], bottom: number[]): Measure | undefined {
  if (top.length === 0 || bottom.length === 0) return undefined
  if (basis !== model.problem.basis && ![...top, ...bottom].every((c) => hasMass(model, c))) return undefined
  return { numerator: sumOn(model, stream, basis, top), denominator: sumOn(model, stream, basis, bottom) }
}

/** Sum of component flows on a basis; the total's own column where it is the whole stream. */
function sumOn(model: Model, stream: number, basis: Basis, components: number[]): LinearForm {
  const own = basis === model.problem.basis
  if (components.length === (model.present[stream] as number[]).length)
    return own ? total(model, stream) : otherTotal(model, stream)
  const parts = components.map((c) => (own ? part(model, stream, c) : otherPart(model, stream, c)))
  return {
    columns: parts.flatMap(({ columns }) => columns),
    coefficients: parts.flatMap(({ coefficients }) => coefficients),
    constant: 0,
  }
}

/** Mass of an element, each component's by its formula, over the mass of the stream. */
function elementAssay(model: Model, stream: number, element: string): Measure | undefined {
  const list = model.present[stream] as number[]
  const own = model.problem.basis === 'mass'
  const numerator: LinearForm = { columns: [], coefficients: [], constant: 0 }
  for (const c of list) {
    const atoms = model.atoms[c]
    if (!atoms || !(own || hasMass(model, c))) return undefined
    const share = elementShare(atoms, element)
    if (share === 0) continue
    const form = columnForm(model.flowColumn[stream * model.nComponents + c] as number)
    numerator.columns.push(...form.columns)
    numerator.coefficients.push(share * (own ? 1 : otherPerOwn(model, c)))
  }
  if (numerator.columns.length === 0) return undefined
  return { numerator, denominator: own ? total(model, stream) : otherTotal(model, stream) }
}
