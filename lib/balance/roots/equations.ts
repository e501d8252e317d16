import type { FormulaNode } from '../formula/parse-formula'
import {
  columnForm,
  combine,
  constantForm,
  type LinearForm,
  otherPart,
  otherSum,
  part,
  total,
} from '../measure/measure'
import type { Model } from '../model'
import type { Pending } from '../pending/pending'
import { poolPart, poolTotal } from '../pending/pool'

/**
 * One equation that is not linear, seen at a point: what is left of it, the terms that this is made of, and its gradient
 * (the constant of the form means nothing).
 */
export type Linearised = { value: number; terms: number; gradient: LinearForm }

/** The equations of a rule at a point x of length nColumns; those of an equal composition are without ratios. */
export function equationsOf(model: Model, item: Pending, x: Float64Array): Linearised[] {
  switch (item.kind) {
    case 'composition': {
      const { streams, components } = item.composition
      const whole = poolTotal(model, streams)
      // One stream and one component follow from the others.
      return streams
        .slice(1)
        .flatMap((s) =>
          components
            .slice(1)
            .map((c) =>
              minus(
                times(linear(part(model, s, c), x), linear(whole, x)),
                times(linear(poolPart(model, streams, c), x), linear(total(model, s), x)),
              ),
            ),
        )
    }
    case 'scaled': {
      const { numerator, denominator = constantForm(1) } = item.measure
      return [minus(linear(numerator, x), times(linear(columnForm(item.parameter), x), linear(denominator, x)))]
    }
    case 'formula':
      return [minus(sideAt(model, item.left, x), sideAt(model, item.right, x))]
  }
}

function linear(form: LinearForm, x: Float64Array): Linearised {
  let value = form.constant
  let terms = Math.abs(value)
  for (let k = 0; k < form.columns.length; k++) {
    const term = (form.coefficients[k] as number) * (x[form.columns[k] as number] as number)
    value += term
    terms += Math.abs(term)
  }
  return { value, terms, gradient: form }
}

const minus = (a: Linearised, b: Linearised): Linearised => ({
  value: a.value - b.value,
  terms: a.terms + b.terms,
  gradient: combine(1, a.gradient, -1, b.gradient),
})

const times = (a: Linearised, b: Linearised): Linearised => ({
  value: a.value * b.value,
  terms: a.terms * b.terms,
  gradient: combine(b.value, a.gradient, a.value, b.gradient),
})

function over(a: Linearised, b: Linearised): Linearised {
  const value = a.value / b.value
  return {
    value,
    terms: (a.terms / Math.abs(b.value)) * Math.max(1, b.terms / Math.abs(b.value)),
    gradient: combine(1 / b.value, a.gradient, -value / b.value, b.gradient),
  }
}

function power(a: Linearised, b: Linearised): Linearised {
  const value = a.value ** b.value
  const byBase = b.value === 0 ? 0 : b.value * a.value ** (b.value - 1)
  const isFixed = b.gradient.columns.length === 0
  return {
    value,
    terms: Math.max(Math.abs(value), Math.abs(byBase) * a.terms),
    gradient: combine(byBase, a.gradient, isFixed ? 0 : value * Math.log(a.value), b.gradient),
  }
}

const constant = (value: number): Linearised => ({ value, terms: Math.abs(value), gradient: constantForm(0) })

function sideAt(model: Model, node: FormulaNode, x: Float64Array): Linearised {
  switch (node.kind) {
    case 'number':
      return constant(node.value)
    case 'parameter': {
      const index = model.parameterIndex.get(node.id) as number
      const column = model.parameterColumn[index] as number
      return column >= 0 ? linear(columnForm(column), x) : constant(model.problem.parameters?.[index]?.value as number)
    }
    case 'measure': {
      const s = model.streamIndex.get(node.stream) as number
      const c = model.componentIndex.get(node.component ?? '') ?? -1
      if (node.name === 'flow') return linear(total(model, s), x)
      if (node.name === 'part') return linear(part(model, s, c), x)
      const own = node.name === 'share' || node.name === `${model.problem.basis}Share`
      return own
        ? over(linear(part(model, s, c), x), linear(total(model, s), x))
        : over(linear(otherPart(model, s, c), x), linear(otherSum(model, s), x))
    }
    case 'operation': {
      const left = sideAt(model, node.left, x)
      const right = sideAt(model, node.right, x)
      switch (node.operator) {
        case '+':
          return minus(left, times(constant(-1), right))
        case '-':
          return minus(left, right)
        case '*':
          return times(left, right)
        case '/':
          return over(left, right)
        case '^':
          return power(left, right)
      }
    }
  }
}
