import { lineariseFormula } from '../formula/linearise'
import type { FormulaNode } from '../formula/parse-formula'
import { columnForm, combine, constantForm, type LinearForm, type Measure } from '../measure/measure'
import type { Model } from '../model'
import { fixedValue, type Knowledge, knownMeasure } from '../states/knowledge'
import type { Composition } from './composition'
import type { TurnedRow } from './turned-row'

/** What cannot be written as linear rows until more is known. */
export type Pending =
  | { kind: 'composition'; source: number; composition: Composition }
  | { kind: 'scaled'; source: number; measure: Measure; parameter: number }
  | { kind: 'formula'; source: number; left: FormulaNode; right: FormulaNode }

/** numerator - parameter x denominator = 0 once the parameter, the denominator or the ratio is known. */
export function turnScaled(
  knowledge: Knowledge,
  { measure, parameter }: Pending & { kind: 'scaled' },
): TurnedRow | undefined {
  const { numerator, denominator = constantForm(1) } = measure
  const parameterForm = columnForm(parameter)
  const value = fixedValue(knowledge, parameterForm)
  if (value !== undefined)
    return {
      form: combine(1, numerator, -value, denominator),
      restsOn: [combine(1, parameterForm, -1, constantForm(value))],
    }
  const bottom = fixedValue(knowledge, denominator)
  if (bottom !== undefined)
    return {
      form: combine(1, numerator, -bottom, parameterForm),
      restsOn: [combine(1, denominator, -1, constantForm(bottom))],
    }
  const ratio = knownMeasure(knowledge, { numerator, denominator })
  if (ratio === undefined) return undefined
  return {
    form: combine(1, parameterForm, -1, constantForm(ratio)),
    restsOn: [combine(1, numerator, -ratio, denominator)],
  }
}

/** A formula's row once it is linear with what is known put in. */
export function turnFormula(
  model: Model,
  knowledge: Knowledge | undefined,
  sides: { left: FormulaNode; right: FormulaNode },
): TurnedRow | undefined {
  const restsOn: LinearForm[] = []
  const form = lineariseFormula(model, sides, ({ top, bottom }) => {
    if (!knowledge) return undefined
    const value = knownMeasure(knowledge, { numerator: top, denominator: bottom })
    if (value !== undefined) restsOn.push(combine(1, top, -value, bottom))
    return value
  })
  return form && { form, restsOn }
}
