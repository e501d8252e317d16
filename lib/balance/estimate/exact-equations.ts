import type { FormulaNode } from '../formula/parse-formula'
import { columnForm, constantForm, type LinearForm, otherShare, otherSum, part, share, total } from '../measure/measure'
import type { Model } from '../model'
import type { Composition } from '../pending/composition'
import type { Pending } from '../pending/pending'
import { poolPart, poolTotal } from '../pending/pool'
import { formAt } from './readings'

/** A value at a point with its gradient over the columns, and the size of the terms that it is made of. */
export type Sloped = { value: number; size: number; slope: LinearForm[]; factors: number[] }

/** An exact row that is not linear: 0 where it holds. */
export type Equation = (x: Float64Array) => Sloped

/** Equations, and unknowns of their own beyond the model's columns: how much of another stream's flows a stream has. */
export type Equations = {
  list: Equation[]
  /** For each further unknown the two totals whose ratio it is. */
  ratios: { of: LinearForm; to: LinearForm }[]
}

/**
 * Exact rules that could not be turned linear, as equations in the columns. Streams of one composition are multiples
 * of one of them (of a splitter's inlets), each multiple a further unknown: so written, the equations keep their rank
 * however the streams come to be known.
 */
export function equationsOf(model: Model, left: readonly Pending[]): Equations {
  const equations: Equations = { list: [], ratios: [] }
  for (const item of left) {
    if (item.kind === 'composition') pushComposition(model, item.composition, equations)
    else if (item.kind === 'formula')
      equations.list.push((x) => minus(node(model, item.left, x), node(model, item.right, x)))
    else {
      const { numerator, denominator = constantForm(1) } = item.measure
      const parameter = columnForm(item.parameter)
      equations.list.push((x) => minus(linear(numerator, x), times(linear(parameter, x), linear(denominator, x))))
    }
  }
  return equations
}

function pushComposition(model: Model, { streams, components, mixed }: Composition, { list, ratios }: Equations): void {
  const whole = mixed.length > 0 ? mixed : [streams[0] as number]
  // Of a splitter the last outlet follows from its balances.
  for (const s of mixed.length > 0 ? streams.slice(0, -1) : streams.slice(1)) {
    const ratio = columnForm(model.nColumns + ratios.length)
    ratios.push({ of: poolTotal(model, [s]), to: poolTotal(model, whole) })
    for (const c of components)
      list.push((x) =>
        minus(linear(poolPart(model, [s], c), x), times(linear(ratio, x), linear(poolPart(model, whole, c), x))),
      )
  }
}

function linear(form: LinearForm, x: Float64Array): Sloped {
  const value = formAt(form, x)
  return { value, size: Math.abs(value), slope: [form], factors: [1] }
}

const constant = (value: number): Sloped => ({ value, size: Math.abs(value), slope: [], factors: [] })

const joined = (value: number, size: number, a: Sloped, byA: number, b: Sloped, byB: number): Sloped => ({
  value,
  size,
  slope: [...a.slope, ...b.slope],
  factors: [...a.factors.map((factor) => factor * byA), ...b.factors.map((factor) => factor * byB)],
})

const minus = (a: Sloped, b: Sloped): Sloped => joined(a.value - b.value, Math.max(a.size, b.size), a, 1, b, -1)
const times = (a: Sloped, b: Sloped): Sloped =>
  joined(a.value * b.value, Math.abs(a.value * b.value), a, b.value, b, a.value)

function over(a: Sloped, b: Sloped): Sloped {
  const value = a.value / b.value
  return joined(value, Math.abs(value), a, 1 / b.value, b, -value / b.value)
}

function node(model: Model, its: FormulaNode, x: Float64Array): Sloped {
  switch (its.kind) {
    case 'number':
      return constant(its.value)
    case 'parameter': {
      const index = model.parameterIndex.get(its.id) as number
      const column = model.parameterColumn[index] as number
      return column >= 0 ? linear(columnForm(column), x) : constant(model.problem.parameters?.[index]?.value as number)
    }
    case 'measure': {
      const s = model.streamIndex.get(its.stream) as number
      const c = model.componentIndex.get(its.component ?? '') as number
      if (its.name === 'flow') return linear(total(model, s), x)
      if (its.name === 'part') return linear(part(model, s, c), x)
      const own = its.name === 'share' || its.name === `${model.problem.basis}Share`
      const top = own ? share(model, s, c).numerator : otherShare(model, s, c).numerator
      return over(linear(top, x), linear(own ? total(model, s) : otherSum(model, s), x))
    }
    case 'operation': {
      const a = node(model, its.left, x)
      const b = node(model, its.right, x)
      switch (its.operator) {
        case '+':
          return joined(a.value + b.value, Math.max(a.size, b.size), a, 1, b, 1)
        case '-':
          return minus(a, b)
        case '*':
          return times(a, b)
        case '/':
          return over(a, b)
        case '^': {
          const value = a.value ** b.value
          const byExponent = b.slope.length === 0 ? 0 : value * Math.log(a.value)
          return joined(value, Math.abs(value), a, b.value * a.value ** (b.value - 1), b, byExponent)
        }
      }
    }
  }
}
