import { columnForm, constantForm, type LinearForm, otherShare, otherSum, part, share, total } from '../measure/measure'
import type { Model } from '../model'
import type { FormulaNode, MeasureName } from './parse-formula'
import { add, constantQuotient, equate, invert, type Known, multiply, numberOf, power, type Quotient } from './quotient'

/**
 * A formula as one linear form that must be 0, putting in what is already known where a product or ratio is not
 * linear; undefined while it is not. Not a number (a division by 0) gives undefined too.
 */
export function lineariseFormula(
  model: Model,
  sides: { left: FormulaNode; right: FormulaNode },
  known: Known,
): LinearForm | undefined {
  const left = quotientOf(model, sides.left, known)
  const right = quotientOf(model, sides.right, known)
  const form = left && right && equate(left, right, known)
  return form && [form.constant, ...form.coefficients].every(Number.isFinite) ? form : undefined
}

function quotientOf(model: Model, node: FormulaNode, known: Known): Quotient | undefined {
  switch (node.kind) {
    case 'number':
      return constantQuotient(node.value)
    case 'parameter':
      return parameter(model, node.id)
    case 'measure':
      return measure(model, node.name, node.stream, node.component)
    case 'operation': {
      const left = quotientOf(model, node.left, known)
      const right = quotientOf(model, node.right, known)
      if (!left || !right) return undefined
      return operate(node.operator, left, right) ?? withKnown(node.operator, left, right, known)
    }
  }
}

function operate(operator: string, left: Quotient, right: Quotient): Quotient | undefined {
  switch (operator) {
    case '+':
      return add(left, right, 1)
    case '-':
      return add(left, right, -1)
    case '*':
      return multiply(left, right)
    case '/':
      return numberOf(right) === 0 ? undefined : multiply(left, invert(right))
    default:
      return power(left, right)
  }
}

/** The same with one operand, then both, taken at its known value. */
function withKnown(operator: string, left: Quotient, right: Quotient, known: Known): Quotient | undefined {
  const a = known(left)
  const b = known(right)
  const fixedLeft = a === undefined ? undefined : constantQuotient(a)
  const fixedRight = b === undefined ? undefined : constantQuotient(b)
  return (
    (fixedLeft && operate(operator, fixedLeft, right)) ??
    (fixedRight && operate(operator, left, fixedRight)) ??
    (fixedLeft && fixedRight && operate(operator, fixedLeft, fixedRight))
  )
}

function parameter(model: Model, id: string): Quotient {
  const index = model.parameterIndex.get(id) as number
  const column = model.parameterColumn[index] as number
  const top = column >= 0 ? columnForm(column) : constantForm(model.problem.parameters?.[index]?.value as number)
  return { top, bottom: constantForm(1) }
}

function measure(model: Model, name: MeasureName, streamId: string, componentId = ''): Quotient {
  const stream = model.streamIndex.get(streamId) as number
  const component = model.componentIndex.get(componentId) as number
  const bottom = constantForm(1)
  if (name === 'flow') return { top: total(model, stream), bottom }
  if (name === 'part') return { top: part(model, stream, component), bottom }
  if (name === 'share' || name === `${model.problem.basis}Share`) {
    const { numerator, denominator } = share(model, stream, component)
    return { top: numerator, bottom: denominator as LinearForm }
  }
  return { top: otherShare(model, stream, component).numerator, bottom: otherSum(model, stream) }
}
