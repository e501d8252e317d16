import { columnForm, combine, constantForm, type LinearForm, type Measure, part, total } from '../measure/measure'
import { type Model, otherPerOwn, type UnitModel } from '../model'
import type { Rule } from '../problem'
import { made, netIn } from './balances'

/** The measures that a rule with a value holds, each at that value. Empty for the two kinds without one. */
export function measuresOfRule(model: Model, rule: Rule): Measure[] {
  const at = (stream: string): number => model.streamIndex.get(stream) as number
  const of = (component: string): number => model.componentIndex.get(component) as number
  const unitOf = (id: string): UnitModel => model.plant[model.unitIndex.get(id) as number] as UnitModel
  switch (rule.kind) {
    case 'split': {
      const unit = unitOf(rule.unit)
      const stream = at(rule.stream)
      return presentAt(model, [stream, ...unit.inlets]).map((c) => ({
        numerator: part(model, stream, c),
        denominator: fed(model, unit, c),
      }))
    }
    case 'recovery': {
      const c = of(rule.component)
      return [{ numerator: part(model, at(rule.stream), c), denominator: fed(model, unitOf(rule.unit), c) }]
    }
    case 'conversion': {
      const unit = unitOf(rule.unit)
      const c = of(rule.component)
      return [{ numerator: used(model, unit, c), denominator: fed(model, unit, c) }]
    }
    case 'flowRatio':
      return [{ numerator: total(model, at(rule.stream)), denominator: total(model, at(rule.of)) }]
    case 'componentRatio':
      return [
        {
          numerator: part(model, at(rule.stream), of(rule.component)),
          denominator: part(model, at(rule.of.stream), of(rule.of.component)),
        },
      ]
    case 'extent':
      return [{ numerator: columnForm(model.extentColumn[model.reactionIndex.get(rule.reaction) as number] as number) }]
    case 'yield': {
      const unit = unitOf(rule.unit)
      return [{ numerator: formed(model, unit, of(rule.product)), denominator: fedMoles(model, unit, of(rule.from)) }]
    }
    case 'selectivity': {
      const unit = unitOf(rule.unit)
      return [{ numerator: formed(model, unit, of(rule.product)), denominator: formed(model, unit, of(rule.over)) }]
    }
    case 'excess': {
      const reaction = model.reactions[model.reactionIndex.get(rule.reaction) as number]
      const numberOf = (c: number): number => Math.abs(reaction?.moles[reaction.components.indexOf(c)] as number)
      const unit = unitOf(rule.unit)
      const wanted = numberOf(of(rule.component)) / numberOf(of(rule.limiting))
      const needed = combine(wanted, fedMoles(model, unit, of(rule.limiting)), 0, constantForm(0))
      return [{ numerator: combine(1, fedMoles(model, unit, of(rule.component)), -1, needed), denominator: needed }]
    }
    case 'sameComposition':
    case 'formula':
      return []
  }
}

function presentAt(model: Model, streams: number[]): number[] {
  return [...new Set(streams.flatMap((s) => model.present[s] as number[]))].sort((a, b) => a - b)
}

/** Flow of a component into a unit, all inlets. */
function fed(model: Model, unit: UnitModel, component: number): LinearForm {
  const columns = unit.inlets
    .map((s) => model.flowColumn[s * model.nComponents + component] as number)
    .filter((column) => column >= 0)
  return { columns, coefficients: columns.map(() => 1), constant: 0 }
}

const molesPerOwn = (model: Model, component: number): number =>
  model.problem.basis === 'mole' ? 1 : otherPerOwn(model, component)

function fedMoles(model: Model, unit: UnitModel, component: number): LinearForm {
  return combine(molesPerOwn(model, component), fed(model, unit, component), 0, constantForm(0))
}

/** Where a unit's components are balanced through extents; elsewhere what reacts is seen in the streams alone. */
const hasExtents = (unit: UnitModel): boolean => unit.reactions.length > 0 && !unit.byElements

/** What a unit uses up of a component: what its reactions take, else what enters and does not leave. */
function used(model: Model, unit: UnitModel, component: number): LinearForm {
  const holds = (model.problem.units[model.unitIndex.get(unit.id) as number]?.inventory ?? []).length > 0
  if (hasExtents(unit) && (holds || unit.inlets.length * unit.outlets.length === 0))
    return combine(-1, made(model, unit, component), 0, constantForm(0))
  return netIn(model, unit, component)
}

/** Moles formed, net: through the extents where there are some, else leaving less entering. */
function formed(model: Model, unit: UnitModel, component: number): LinearForm {
  if (hasExtents(unit)) return combine(1, made(model, unit, component, true), 0, constantForm(0))
  return combine(-molesPerOwn(model, component), netIn(model, unit, component), 0, constantForm(0))
}
