import { combine, constantForm, type LinearForm, total } from '../measure/measure'
import { unitFactor } from '../measure/typed-value'
import { type Model, otherPerOwn, type UnitModel } from '../model'
import type { Unit } from '../problem'
import type { RowStore } from './row-store'

/** True where a unit can be balanced: something enters and leaves, or a gain of what it holds is typed. */
export function isBalanced(model: Model, unit: number): boolean {
  const { inlets, outlets } = model.plant[unit] as UnitModel
  const holds = (model.problem.units[unit]?.inventory ?? []).length > 0
  return (inlets.length > 0 && outlets.length > 0) || (holds && inlets.length + outlets.length > 0)
}

/** Balance rows of every unit: what enters, less what leaves, plus what reactions make, is what the unit gains. */
export function pushBalances(model: Model, rows: RowStore): void {
  model.plant.forEach((unit, index) => {
    if (!isBalanced(model, index)) return
    const gain = typedGain(model, model.problem.units[index] as Unit)
    if (unit.byElements) pushElements(model, rows, index, gain)
    else pushComponents(model, rows, index, gain)
    pushTotal(model, rows, index, gain)
  })
}

type Gain = { byComponent: Map<number, number>; total: number | undefined }

function typedGain(model: Model, unit: Unit): Gain {
  const gain: Gain = { byComponent: new Map(), total: undefined }
  for (const { component, value, unit: unitText } of unit.inventory ?? []) {
    const own = value * unitFactor(model, 'flow', unitText)
    const c = component === undefined ? -1 : (model.componentIndex.get(component) as number)
    if (c < 0) gain.total = (gain.total ?? 0) + own
    else gain.byComponent.set(c, (gain.byComponent.get(c) ?? 0) + own)
  }
  return gain
}

/** Inlets less outlets of one component (form of columns). */
export function netIn(model: Model, unit: UnitModel, component: number): LinearForm {
  const form = constantForm(0)
  const add = (stream: number, sign: number): void => {
    const column = model.flowColumn[stream * model.nComponents + component] as number
    if (column < 0) return
    form.columns.push(column)
    form.coefficients.push(sign)
  }
  for (const s of unit.inlets) add(s, 1)
  for (const s of unit.outlets) add(s, -1)
  return form
}

/** What the reactions of a unit make of one component, in the book's flow unit. */
export function made(model: Model, unit: UnitModel, component: number, moles = false): LinearForm {
  const form = constantForm(0)
  for (const r of unit.reactions) {
    const reaction = model.reactions[r]
    reaction?.components.forEach((c, k) => {
      if (c !== component) return
      form.columns.push(model.extentColumn[r] as number)
      form.coefficients.push((moles ? reaction.moles : reaction.change)[k] as number)
    })
  }
  return form
}

/** Components in a stream at the unit or taking part in a reaction in it, ascending. */
function componentsAt(model: Model, unit: UnitModel): number[] {
  const found = new Set<number>()
  for (const s of [...unit.inlets, ...unit.outlets]) for (const c of model.present[s] as number[]) found.add(c)
  for (const r of unit.reactions) for (const c of model.reactions[r]?.components ?? []) found.add(c)
  return [...found].sort((a, b) => a - b)
}

function pushComponents(model: Model, rows: RowStore, index: number, gain: Gain): void {
  const unit = model.plant[index] as UnitModel
  for (const component of componentsAt(model, unit)) {
    const typed = gain.byComponent.get(component)
    // With only a total gain typed, what the unit gains of each component is not known: no row of its own.
    if (typed === undefined && gain.total !== undefined) continue
    const row = netIn(model, unit, component)
    const making = made(model, unit, component)
    row.columns.push(...making.columns)
    row.coefficients.push(...making.coefficients)
    if (row.columns.length === 0 && (typed ?? 0) === 0) continue
    rows.push(rows.from({ type: 'balance', unit: index, component }), row.columns, row.coefficients, typed ?? 0)
  }
}

/** One row per element: atoms that enter, less those that leave, in moles of the book. */
function pushElements(model: Model, rows: RowStore, index: number, gain: Gain): void {
  const unit = model.plant[index] as UnitModel
  if (gain.total !== undefined) return
  const molesOf = (c: number): number => (model.problem.basis === 'mole' ? 1 : otherPerOwn(model, c))
  const components = componentsAt(model, unit)
  const elements = [...new Set(components.flatMap((c) => Object.keys(model.atoms[c] ?? {})))].sort()
  for (const element of elements) {
    let row = constantForm(0)
    let held = 0
    for (const c of components) {
      const atoms = (model.atoms[c]?.[element] ?? 0) * molesOf(c)
      if (atoms === 0) continue
      row = combine(1, row, atoms, netIn(model, unit, c))
      held += atoms * (gain.byComponent.get(c) ?? 0)
    }
    if (row.columns.length === 0 && held === 0) continue
    rows.push(rows.from({ type: 'balance', unit: index, element }), row.columns, row.coefficients, held)
  }
}

/**
 * The total balance: the sum of the component balances, so it adds nothing to the rank, but it is the one that gives a
 * flow without its composition. Left out for element balances, except where a total gain is typed on a mass basis.
 */
function pushTotal(model: Model, rows: RowStore, index: number, gain: Gain): void {
  const unit = model.plant[index] as UnitModel
  if (unit.byElements && (gain.total === undefined || model.problem.basis === 'mole')) return
  let row = constantForm(0)
  for (const s of unit.inlets) row = combine(1, row, 1, total(model, s))
  for (const s of unit.outlets) row = combine(1, row, -1, total(model, s))
  if (!unit.byElements && model.problem.basis === 'mole')
    for (const c of componentsAt(model, unit)) row = combine(1, row, 1, made(model, unit, c))
  let held = gain.total ?? 0
  if (gain.total === undefined) for (const value of gain.byComponent.values()) held += value
  if (row.columns.length === 0 && held === 0) return
  rows.push(rows.from({ type: 'balance', unit: index }), row.columns, row.coefficients, held)
}
