import type { FormulaNode } from '../formula/parse-formula'
import { columnForm, constantForm, type LinearForm, otherShare, otherSum, part, share, total } from '../measure/measure'
import type { Model } from '../model'
import type { Pending } from '../pending/pending'
import { poolPart, poolTotal } from '../pending/pool'
import { formAt } from './readings'

/** A value at a point with its gradient over the columns, and the size of the terms that it is made of. */
export type Sloped = { value: number; size: number; slope: LinearForm[]; factors: number[] }

/** An exact row that is not linear: 0 where it holds. */
export type Equation = (x: Float64Array) => Sloped

/** Exact rules that could not be turned linear, as equations in the columns. */
export const equationsOf = (model: Model, left: readonly Pending[]): Equation[] =>
  left.flatMap((item) => equationsOfOne(model, item))

function equationsOfOne(model: Model, item: Pending): Equation[] {
  switch (item.kind) {
    case 'composition': {
      const { streams, components } = item.composition
      const [first, ...rest] = streams as [number, ...number[]]
      // One component of each follows from the others.
      return rest.flatMap((s) =>
        components.slice(1).map((c) => (x: Float64Array) => {
          const left_ = times(linear(poolPart(model, [s], c), x), linear(poolTotal(model, [first]), x))
          return minus(left_, times(linear(poolPart(model, [first], c), x), linear(poolTotal(model, [s]), x)))
        }),
      )
    }
    case 'scaled': {
      const { numerator, denominator = constantForm(1) } = item.measure
      const parameter = columnForm(item.parameter)
      return [(x) => minus(linear(numerator, x), times(linear(parameter, x), linear(denominator, x)))]
    }
    case 'formula':
      return [(x) => minus(node(model, item.left, x), node(model, item.right, x))]
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
