import type { FormulaNode, Operator } from '../formula/parse-formula'
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

/** An equation that is not linear as a tree over linear forms; it holds where it is 0. */
export type Expression = LinearForm | { operator: Operator; left: Expression; right: Expression }

/** A value, the size of the terms that it is made of, and its gradient. */
export type Evaluated<G> = { value: number; terms: number; gradient: G }

/** How linear forms and sums of gradients are had: over columns, or over the few directions of a block. */
export type Calculus<G> = {
  linear: (form: LinearForm) => Evaluated<G>
  /** a x left + b x right */
  combine: (a: number, left: G, b: number, right: G) => G
}

/** The equations of a rule; those of an equal composition are without ratios. */
export function equationsOf(model: Model, item: Pending): Expression[] {
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
              on('-', on('*', part(model, s, c), whole), on('*', poolPart(model, streams, c), poolTotal(model, [s]))),
            ),
        )
    }
    case 'scaled': {
      const { numerator, denominator = constantForm(1) } = item.measure
      return [on('-', numerator, on('*', columnForm(item.parameter), denominator))]
    }
    case 'formula':
      return [on('-', sideOf(model, item.left), sideOf(model, item.right))]
  }
}

const on = (operator: Operator, left: Expression, right: Expression): Expression => ({ operator, left, right })

function sideOf(model: Model, node: FormulaNode): Expression {
  switch (node.kind) {
    case 'number':
      return constantForm(node.value)
    case 'parameter': {
      const index = model.parameterIndex.get(node.id) as number
      const column = model.parameterColumn[index] as number
      return column >= 0 ? columnForm(column) : constantForm(model.problem.parameters?.[index]?.value as number)
    }
    case 'measure': {
      const s = model.streamIndex.get(node.stream) as number
      const c = model.componentIndex.get(node.component ?? '') ?? -1
      if (node.name === 'flow') return total(model, s)
      if (node.name === 'part') return part(model, s, c)
      const own = node.name === 'share' || node.name === `${model.problem.basis}Share`
      return own ? on('/', part(model, s, c), total(model, s)) : on('/', otherPart(model, s, c), otherSum(model, s))
    }
    case 'operation':
      return on(node.operator, sideOf(model, node.left), sideOf(model, node.right))
  }
}

/** Linear forms that an expression is made of. */
export function formsOf(expression: Expression): LinearForm[] {
  return 'operator' in expression ? [...formsOf(expression.left), ...formsOf(expression.right)] : [expression]
}

/** Value and gradient of an expression, by the rules of differentiation. */
export function evaluateExpression<G>(expression: Expression, calculus: Calculus<G>): Evaluated<G> {
  if (!('operator' in expression)) return calculus.linear(expression)
  const a = evaluateExpression(expression.left, calculus)
  const b = evaluateExpression(expression.right, calculus)
  switch (expression.operator) {
    case '+':
    case '-': {
      const sign = expression.operator === '+' ? 1 : -1
      return {
        value: a.value + sign * b.value,
        terms: a.terms + b.terms,
        gradient: calculus.combine(1, a.gradient, sign, b.gradient),
      }
    }
    case '*':
      return {
        value: a.value * b.value,
        terms: a.terms * b.terms,
        gradient: calculus.combine(b.value, a.gradient, a.value, b.gradient),
      }
    case '/': {
      const value = a.value / b.value
      const below = Math.abs(b.value)
      return {
        value,
        terms: (a.terms / below) * Math.max(1, b.terms / below),
        gradient: calculus.combine(1 / b.value, a.gradient, -value / b.value, b.gradient),
      }
    }
    case '^': {
      const value = a.value ** b.value
      const byBase = b.value === 0 ? 0 : b.value * a.value ** (b.value - 1)
      const isFixed = !('operator' in expression.right) && expression.right.columns.length === 0
      return {
        value,
        terms: Math.max(Math.abs(value), Math.abs(byBase) * a.terms),
        gradient: calculus.combine(byBase, a.gradient, isFixed ? 0 : value * Math.log(a.value), b.gradient),
      }
    }
  }
}

/** Value and terms of a form at a point x of length nColumns. */
export function formAt(form: LinearForm, x: Float64Array): { value: number; terms: number } {
  let value = form.constant
  let terms = Math.abs(value)
  for (let k = 0; k < form.columns.length; k++) {
    const term = (form.coefficients[k] as number) * (x[form.columns[k] as number] as number)
    value += term
    terms += Math.abs(term)
  }
  return { value, terms }
}

/** Gradients as forms of columns at a point; their constants mean nothing. */
export const overColumns = (x: Float64Array): Calculus<LinearForm> => ({
  linear: (form) => ({ ...formAt(form, x), gradient: form }),
  combine,
})
