import { lineariseFormula } from '../formula/linearise'
import { type FormulaNode, leavesOf } from '../formula/parse-formula'
import { type Known, proportion, type Quotient } from '../formula/quotient'
import { columnForm, combine, constantForm, type LinearForm, otherShare, share } from '../measure/measure'
import type { Model } from '../model'
import type { Pending } from '../pending/pending'
import { poolPart, poolTotal } from '../pending/pool'
import { fixedValue, type Knowledge, knownMeasure } from '../states/knowledge'

/** Values that a scalar can take with no flow negative. */
export type Range = 'part' | 'notNegative' | 'any'

/** A number that, once known, turns the rules that hold it into linear rows. */
export type Scalar = { key: string; range: Range }

/** A rule with the scalars that stand in its way: for values of these, forms that must be 0. */
export type ScalarRule = {
  item: Pending
  scalars: Scalar[]
  /** undefined where the values make no sense, such as a division by 0. `values` in the order of `scalars`. */
  lines: (values: readonly number[]) => LinearForm[] | undefined
  /** The lines change in proportion to the values. */
  isProportional: boolean
}

/** More leaves of one formula than this are not tried as scalars. */
const MOST_LEAVES = 4

/** The rule with its scalars, given what is known. undefined for a formula that no few scalars make linear. */
export function scalarRule(model: Model, knowledge: Knowledge, item: Pending): ScalarRule | undefined {
  switch (item.kind) {
    case 'composition':
      return compositionRule(model, knowledge, item)
    case 'scaled': {
      const { numerator, denominator = constantForm(1) } = item.measure
      const range = isFlow(model, numerator) && isFlow(model, denominator) ? 'notNegative' : 'any'
      const whole = combine(1, denominator, -1, numerator)
      return {
        item,
        scalars: [parameterScalar(item.parameter, range === 'notNegative' && isFlow(model, whole) ? 'part' : range)],
        isProportional: true,
        lines: ([value = 0]) => [combine(1, numerator, -value, denominator), heldAt(item.parameter, value)],
      }
    }
    case 'formula':
      return formulaRule(model, knowledge, item)
  }
}

const parameterScalar = (column: number, range: Range): Scalar => ({ key: `parameter ${column}`, range })
const heldAt = (column: number, value: number): LinearForm => ({
  columns: [column],
  coefficients: [1],
  constant: -value,
})

/** True where a form is a sum of flows, so that it cannot be negative. */
function isFlow(model: Model, { columns, coefficients, constant }: LinearForm): boolean {
  const otherTotal = 2
  return (
    constant >= 0 &&
    coefficients.every((coefficient) => coefficient >= 0) &&
    columns.every((j) => (model.columnKind[j] as number) <= otherTotal)
  )
}

/** Streams whose flows stand in a known ratio are one group; each group but the last is an unknown part of all groups. */
function compositionRule(model: Model, knowledge: Knowledge, item: Pending & { kind: 'composition' }): ScalarRule {
  const { streams, components } = item.composition
  const groups: number[][] = []
  for (const s of streams) {
    if (fixedValue(knowledge, poolTotal(model, [s])) === 0) continue
    const known = groups.find((group) => hasKnownRatio(model, knowledge, s, group[0] as number))
    if (known) known.push(s)
    else groups.push([s])
  }
  const whole = poolTotal(model, streams)
  const open = groups.filter(
    (group) =>
      knownMeasure(knowledge, { numerator: poolTotal(model, [group[0] as number]), denominator: whole }) === undefined,
  )
  const rest = open.flat()
  const key = (group: number[]): string => `part ${[...group].sort().join(' ')} of ${[...rest].sort().join(' ')}`
  return {
    item,
    isProportional: true,
    scalars: open.slice(1).map((group) => ({ key: key(group), range: 'part' })),
    lines: (values) =>
      open
        .slice(1)
        .flatMap((group, g) =>
          components.map((c) =>
            combine(1, poolPart(model, group, c), -(values[g] as number), poolPart(model, rest, c)),
          ),
        ),
  }
}

const hasKnownRatio = (model: Model, knowledge: Knowledge, a: number, b: number): boolean =>
  knownMeasure(knowledge, { numerator: poolTotal(model, [a]), denominator: poolTotal(model, [b]) }) !== undefined

type Leaf = { scalar: Scalar; quotient: Quotient }

/** The fewest leaves of a formula that make it linear once they are known. */
function formulaRule(model: Model, knowledge: Knowledge, item: Pending & { kind: 'formula' }): ScalarRule | undefined {
  const leaves = leavesIn(model, knowledge, item)
  const before: Known = ({ top, bottom }) => knownMeasure(knowledge, { numerator: top, denominator: bottom })
  const withValues = (chosen: readonly Leaf[], values: readonly number[]): LinearForm | undefined =>
    lineariseFormula(model, item, (quotient) => before(quotient) ?? valueAmong(quotient, chosen, values))
  for (const chosen of subsets(leaves, MOST_LEAVES)) {
    // Values that mean nothing, only to see whether the formula is linear with them.
    if (
      !withValues(
        chosen,
        chosen.map((_, k) => 0.37 + 0.11 * k),
      )
    )
      continue
    return {
      item,
      isProportional: false,
      scalars: chosen.map(({ scalar }) => scalar),
      lines: (values) => {
        const form = withValues(chosen, values)
        return (
          form && [
            form,
            ...chosen.map(({ quotient: { top, bottom } }, k) => combine(1, top, -(values[k] as number), bottom)),
          ]
        )
      },
    }
  }
  return undefined
}

function valueAmong({ top, bottom }: Quotient, leaves: readonly Leaf[], values: readonly number[]): number | undefined {
  for (const [k, { quotient }] of leaves.entries()) {
    const up = proportion(top, quotient.top)
    const down = proportion(bottom, quotient.bottom)
    if (up !== undefined && down) return ((values[k] as number) * up) / down
  }
  return undefined
}

/** Distinct parameters and measures of a formula that are not known, parameters first. */
function leavesIn(model: Model, knowledge: Knowledge, item: { left: FormulaNode; right: FormulaNode }): Leaf[] {
  const found = new Map<string, Leaf>()
  for (const leaf of [...leavesOf(item.left), ...leavesOf(item.right)]) {
    const its =
      leaf.kind === 'parameter' ? ofParameter(model, leaf.id) : leaf.kind === 'measure' && ofMeasure(model, leaf)
    if (!its) continue
    const { top, bottom } = its.quotient
    if (knownMeasure(knowledge, { numerator: top, denominator: bottom }) === undefined) found.set(its.scalar.key, its)
  }
  return [...found.values()].sort((a, b) => Number(a.scalar.range !== 'any') - Number(b.scalar.range !== 'any'))
}

function ofParameter(model: Model, id: string): Leaf | undefined {
  const column = model.parameterColumn[model.parameterIndex.get(id) as number] as number
  if (column < 0) return undefined
  return { scalar: parameterScalar(column, 'any'), quotient: { top: columnForm(column), bottom: constantForm(1) } }
}

function ofMeasure(model: Model, leaf: FormulaNode & { kind: 'measure' }): Leaf {
  const s = model.streamIndex.get(leaf.stream) as number
  const c = model.componentIndex.get(leaf.component ?? '') ?? -1
  const key = `${leaf.name} ${s} ${c}`
  if (leaf.name === 'flow' || leaf.name === 'part') {
    const top = leaf.name === 'flow' ? poolTotal(model, [s]) : poolPart(model, [s], c)
    return { scalar: { key, range: 'notNegative' }, quotient: { top, bottom: constantForm(1) } }
  }
  const own = leaf.name === 'share' || leaf.name === `${model.problem.basis}Share`
  const { numerator, denominator } = (own ? share : otherShare)(model, s, c)
  return {
    scalar: { key: own ? `share ${s} ${c}` : key, range: 'part' },
    quotient: { top: numerator, bottom: denominator as LinearForm },
  }
}

/** Subsets of one, then two, ... up to `most` members. */
function* subsets<T>(list: readonly T[], most: number): Generator<T[]> {
  const choose = function* (from: number, size: number): Generator<T[]> {
    if (size === 0) yield []
    else
      for (let k = from; k <= list.length - size; k++)
        for (const rest of choose(k + 1, size - 1)) yield [list[k] as T, ...rest]
  }
  for (let size = 1; size <= Math.min(most, list.length); size++) yield* choose(0, size)
}
