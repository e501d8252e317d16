import { parseFormulaText } from '../formula/parse-formula'
import { columnForm, type Measure, part } from '../measure/measure'
import { DEFAULT_HALF_WIDTH } from '../measure/typed-value'
import { ColumnKind, type Model } from '../model'
import { compositionOf } from '../pending/composition'
import { type Pending, turnFormula } from '../pending/pending'
import type { Rule, Value } from '../problem'
import { pushBalances } from './balances'
import { pushDefinitions } from './definitions'
import { type FractionClash, type GivenInUse, givensInUse, pushGivens } from './givens'
import { type AssemblyOptions, type Member, memberOfRule } from './members'
import { RowStore } from './row-store'
import { measuresOfRule } from './rules'

/** All rows of a problem as they stand before anything is known, and what is still to turn into rows. */
export type Assembly = {
  rows: RowStore
  pending: Pending[]
  givens: GivenInUse[]
  /** Streams whose typed fractions do not add up; their fractions are not among the rows. */
  clashes: FractionClash[]
  /** 1 for columns that are flows and so cannot be negative; length nColumns. */
  nonNegative: Uint8Array
}

export const ruleInUse = (rule: Rule): boolean => (rule.use ?? 'given') === 'given'

/** Fixed value of a rule's value, undefined where it is a free parameter. */
export function fixedRuleValue(model: Model, value: Value): number | undefined {
  if (typeof value === 'number') return value
  return model.problem.parameters?.[model.parameterIndex.get(value.parameter) as number]?.value
}

/** Builds every row of a checked problem. Cost is proportional to the entries. */
export function assemble(model: Model, options: AssemblyOptions = {}): Assembly {
  const rows = structureRows(model).copy()
  const pending: Pending[] = []
  const { givens, clashes } = givensInUse(model, options)
  const clashing = new Set(clashes.flatMap(({ members }) => members))
  pushGivens(
    model,
    rows,
    givens.filter((given) => !clashing.has(given) && !options.leaveOut?.has(given.index)),
  )
  model.plant.forEach((unit, index) => {
    if (unit.kind !== 'splitter') return
    const holds = unit.byElements || unit.reactions.length > 0 || model.problem.units[index]?.inventory?.length
    const source = rows.from({ type: 'composition', unit: unit.id })
    pushComposition(model, rows, pending, unit.outlets, source, holds ? [] : unit.inlets)
  })
  model.problem.relations?.forEach((rule, index) => {
    if (ruleInUse(rule) && !options.leaveOut?.has(memberOfRule(model, index)))
      pushRule(model, rows, pending, rule, rows.from({ type: 'rule', index }), options)
  })
  for (const form of options.basis ?? []) rows.push(rows.from({ type: 'basis' }), form.columns, form.coefficients, 1)
  const nonNegative = model.columnKind.map((kind) => Number(kind <= ColumnKind.otherTotal))
  return { rows, pending, givens, clashes, nonNegative }
}

/** What each given and rule with a value was typed as, and what the rows take for it now. */
export function typedMembers(
  model: Model,
  { rows, givens }: Assembly,
): Map<Member, { typed: number; value: number; halfWidth: number }> {
  const members = new Map<Member, { typed: number; value: number; halfWidth: number }>()
  for (const { index, base, value, halfWidth } of givens) members.set(index, { typed: base, value, halfWidth })
  rows.source.forEach((number, i) => {
    const source = rows.sources[number]
    const its = rows.typed[i]
    if (its && source?.type === 'rule') members.set(memberOfRule(model, source.index), its)
  })
  return members
}

/** Rows that hold whatever is typed: totals as sums and balances. Built once for a model. */
function structureRows(model: Model): RowStore {
  if (!model.structureRows) {
    model.structureRows = new RowStore()
    pushDefinitions(model, model.structureRows)
    pushBalances(model, model.structureRows)
  }
  return model.structureRows
}

/** Streams of one composition: a component absent from one cannot be in the others; the rest waits until more is known. */
function pushComposition(
  model: Model,
  rows: RowStore,
  pending: Pending[],
  streams: number[],
  source: number,
  mixed: number[] = [],
): void {
  const filled = streams.filter((s) => (model.present[s] as number[]).length > 0)
  if (filled.length < 2) return
  const composition = compositionOf(model, filled, mixed)
  const common = new Set(composition.components)
  for (const s of filled)
    for (const c of model.present[s] as number[])
      if (!common.has(c)) {
        const { columns, coefficients } = part(model, s, c)
        rows.push(source, columns, coefficients, 0)
      }
  if (composition.components.length > 1) pending.push({ kind: 'composition', source, composition })
}

function pushRule(
  model: Model,
  rows: RowStore,
  pending: Pending[],
  rule: Rule,
  source: number,
  { adjusted, perturb = (value) => value }: AssemblyOptions,
): void {
  if (rule.kind === 'sameComposition') {
    const streams = rule.streams.map((id) => model.streamIndex.get(id) as number)
    pushComposition(
      model,
      rows,
      pending,
      [...new Set(streams)].sort((a, b) => a - b),
      source,
    )
    return
  }
  if (rule.kind === 'formula') {
    const parsed = parseFormulaText(rule.text)
    if (!parsed.ok) return
    const turned = turnFormula(model, undefined, parsed)
    if (!turned) pending.push({ kind: 'formula', source, left: parsed.left, right: parsed.right })
    else {
      const { columns, coefficients, constant } = turned.form
      const measure: Measure = { numerator: { columns, coefficients, constant: 0 } }
      const typed = 0 - constant
      const value = adjusted?.get(memberInUse(model, rows, source)) ?? typed
      rows.push(source, columns, coefficients, value, {
        measure,
        typed,
        value,
        halfWidth: halfWidthOfRule(rule, typed),
      })
    }
    return
  }
  const typed = fixedRuleValue(model, rule.value)
  const value = typed === undefined ? undefined : (adjusted?.get(memberInUse(model, rows, source)) ?? perturb(typed))
  for (const measure of measuresOfRule(model, rule)) {
    if (value !== undefined) rows.pushMeasure(source, measure, value, halfWidthOfRule(rule, typed ?? value), typed)
    else {
      const parameter = parameterColumn(model, rule.value)
      if (measure.denominator) pending.push({ kind: 'scaled', source, measure, parameter })
      else rows.pushMeasure(source, { numerator: difference(measure, parameter) }, 0, 0)
    }
  }
}

function memberInUse(model: Model, rows: RowStore, source: number): Member {
  const own = rows.sources[source]
  return own?.type === 'rule' ? memberOfRule(model, own.index) : -1
}

/** Without a half-width of its own a rule is held to a part of its value; a value of 0 to that part of 1. */
export const halfWidthOfRule = (rule: Rule, value: number): number =>
  rule.halfWidth ?? DEFAULT_HALF_WIDTH * (value === 0 ? 1 : Math.abs(value))

function parameterColumn(model: Model, value: Value): number {
  const id = typeof value === 'number' ? '' : value.parameter
  return model.parameterColumn[model.parameterIndex.get(id) as number] as number
}

function difference({ numerator }: Measure, parameter: number): Measure['numerator'] {
  const own = columnForm(parameter, -1)
  return {
    columns: [...numerator.columns, ...own.columns],
    coefficients: [...numerator.coefficients, ...own.coefficients],
    constant: numerator.constant,
  }
}
