import { columnForm, combine, type LinearForm, type Measure } from '../measure/measure'
import { dryPart, namedMeasure, writtenOut } from '../measure/named-measure'
import { isRatio, typedValue } from '../measure/typed-value'
import { type Model, otherPerOwn } from '../model'
import type { Given } from '../problem'
import type { AssemblyOptions } from './members'
import type { RowStore } from './row-store'

/** A given as the rows take it: `value` may differ from what was typed where fractions were scaled or agree by rounding. */
export type GivenInUse = {
  index: number
  given: Given
  stream: number
  /** -1 for a total. */
  component: number
  typed: number
  /** What deviations are counted from: what was typed, unless the person has it scaled. */
  base: number
  value: number
  halfWidth: number
}

/** All fractions of a stream are typed and do not add up to 1 within their half-widths. */
export type FractionClash = { stream: number; members: GivenInUse[]; sum: number }

/** A sum that is off by less than this part of itself needs no choice and no compromise. */
const SUM_CLOSES = 1e-9

/** Givens with `use` left out or 'given', on components that can be present, with the person's choice on fractions applied. */
export function givensInUse(
  model: Model,
  { leaveOut, adjusted, scaleFractions = false, perturb }: AssemblyOptions = {},
): { givens: GivenInUse[]; clashes: FractionClash[] } {
  const givens: GivenInUse[] = []
  const clashes: FractionClash[] = []
  const wholes = new Map<string, Whole>()
  const largestFlow = largestTypedFlow(model)
  model.problem.givens?.forEach((given, index) => {
    if ((given.use ?? 'given') !== 'given') return
    const stream = model.streamIndex.get(given.stream) as number
    const component = given.component === undefined ? -1 : (model.componentIndex.get(given.component) as number)
    if (component >= 0 && (model.flowColumn[stream * model.nComponents + component] as number) < 0) return
    const { value, halfWidth } = typedValue(model, given, largestFlow)
    const used = perturb && value !== 0 && value !== 1 ? perturb(value) : value
    const entry: GivenInUse = { index, given, stream, component, typed: value, base: used, value: used, halfWidth }
    givens.push(entry)
    if (!leaveOut?.has(index)) putInWhole(model, wholes, entry)
  })
  const dropped = new Set<GivenInUse>()
  for (const whole of wholes.values()) {
    const clash = settleFractions(model, whole, dropped, scaleFractions)
    if (clash) clashes.push(clash)
  }
  for (const entry of givens) entry.value = adjusted?.get(entry.index) ?? entry.value
  return { givens: givens.filter((entry) => !dropped.has(entry)), clashes }
}

/** Largest flow typed in the book's unit, 1 where none is. */
function largestTypedFlow(model: Model): number {
  let largest = 0
  for (const given of model.problem.givens ?? [])
    if (given.quantity === 'flow' || given.quantity === 'componentFlow')
      largest = Math.max(largest, Math.abs(typedValue(model, given).value))
  return largest || 1
}

/** Fractions of one stream on one basis, wet or dry, and the components whose fractions add up to 1. */
type Whole = { stream: number; components: number[]; entries: GivenInUse[] }

function putInWhole(model: Model, wholes: Map<string, Whole>, entry: GivenInUse): void {
  const { given, stream, component } = entry
  const { quantity } = given
  if (component < 0 || !quantity.endsWith('Fraction')) return
  const dry = quantity === 'dryMassFraction' || quantity === 'dryMoleFraction'
  const components = dry ? dryPart(model, stream, given) : (model.present[stream] as number[])
  if (dry && !components.includes(component)) return
  const key = `${stream}/${quantity}/${dry ? components.join() : ''}`
  const whole = wholes.get(key)
  if (whole) whole.entries.push(entry)
  else wholes.set(key, { stream, components, entries: [entry] })
}

/** Where every fraction is typed on one basis: scale, drop the one by difference, or share out what rounding leaves. */
function settleFractions(
  model: Model,
  { stream, components: list, entries }: Whole,
  dropped: Set<GivenInUse>,
  scaleAlways: boolean,
): FractionClash | undefined {
  if (entries.length < list.length) return undefined
  const main = list.map(
    (c) =>
      entries.find(({ component, given }) => component === c && isMain(given)) ??
      entries.find(({ component }) => component === c),
  )
  if (list.length === 0 || main.some((entry) => entry === undefined)) return undefined
  const all = main as GivenInUse[]
  const sum = all.reduce((total, { value }) => total + value, 0)
  const typedChoice = model.problem.streams[stream]?.fractions ?? 'asTyped'
  const choice = scaleAlways && typedChoice === 'asTyped' ? 'scale' : typedChoice
  if (typeof choice === 'object') {
    const last = model.componentIndex.get(choice.difference)
    for (const entry of entries) if (entry.component === last) dropped.add(entry)
    return undefined
  }
  if (Math.abs(sum - 1) <= SUM_CLOSES * Math.max(1, sum)) {
    // Rounding of the sum itself goes to the largest, so that the rows close exactly.
    const largest = all.reduce((best, entry) => (entry.typed > best.typed ? entry : best), all[0] as GivenInUse)
    largest.value -= sum - 1
    return undefined
  }
  if (choice === 'scale' && sum > 0) {
    for (const entry of entries) {
      entry.value /= sum
      entry.base = entry.value
      entry.halfWidth /= sum
    }
    return undefined
  }
  const widths = all.reduce((total, { halfWidth }) => total + halfWidth, 0)
  if (Math.abs(sum - 1) > widths * (1 + SUM_CLOSES)) return { stream, members: all, sum }
  const squares = all.reduce((total, { halfWidth }) => total + halfWidth ** 2, 0)
  for (const entry of all) entry.value = entry.typed - (entry.halfWidth ** 2 / squares) * (sum - 1)
  return undefined
}

const isMain = (given: Given): boolean => (given.instrument ?? 'main') === 'main'

/** One row for each given in use, named by a source of its own; gives the source of each. */
export function pushGivens(model: Model, rows: RowStore, givens: readonly GivenInUse[]): void {
  for (const { index, given, stream, component, base, value, halfWidth } of givens) {
    const measure = namedMeasure(model, stream, given)
    // A checked problem says 0 of what the stream cannot hold: nothing to add.
    if (!measure) continue
    const source = rows.from({ type: 'given', index })
    const typed = { measure, typed: base, value, halfWidth }
    if (component >= 0 && value === 1 && isRatio(given.quantity) && !given.without) {
      // The whole stream is this component: the others together are 0, so each of them is.
      const rest = others(model, stream, component, given.quantity)
      rows.push(source, rest.columns, rest.coefficients, 0, typed)
      continue
    }
    const none = flowsAtZero(model, stream, measure, value)
    if (none) for (const column of none) rows.push(source, [column], [1], 0, typed)
    else rows.pushMeasure(source, measure, value, halfWidth, base)
  }
}

/** Flows that cannot be negative and add up to 0, by a ratio of 0, or of 1 where the rest of what it is of is none. */
function flowsAtZero(model: Model, stream: number, measure: Measure, value: number): number[] | undefined {
  const { numerator, denominator } = measure
  if (!denominator || (value !== 0 && value !== 1)) return undefined
  const top = writtenOut(model, stream, numerator)
  const rest = value === 0 ? top : combine(1, writtenOut(model, stream, denominator), -1, top)
  const adds = rest.columns.length > 1 && rest.coefficients.every((coefficient) => coefficient > 0)
  return adds ? rest.columns : undefined
}

function others(model: Model, stream: number, component: number, quantity: Given['quantity']): LinearForm {
  const own = quantity === `${model.problem.basis}Fraction`
  const list = (model.present[stream] as number[]).filter((c) => c !== component)
  return {
    columns: list.flatMap((c) => columnForm(model.flowColumn[stream * model.nComponents + c] as number).columns),
    coefficients: list.map((c) => (own ? 1 : otherPerOwn(model, c))),
    constant: 0,
  }
}
