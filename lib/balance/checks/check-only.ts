import type { Measure } from '../measure/measure'
import { namedMeasure } from '../measure/named-measure'
import { typedValue } from '../measure/typed-value'
import type { Model } from '../model'
import type { Given, Rule } from '../problem'
import { fixedRuleValue, halfWidthOfRule } from '../rows/assemble'
import { measuresOfRule } from '../rows/rules'
import type { Check, Diagnostic } from '../solution'
import { type Knowledge, knownMeasure } from '../states/knowledge'
import { placeOf } from './places'

type Kept = { given?: Given; rule?: Rule; typed: number; halfWidth: number; implied: number | undefined }

/**
 * One entry for each given and rule that is kept as a check only: what was typed less what all others imply. One whose
 * value the others do not fix is left out here and said in `uncheckedDiagnostics`.
 */
export function checkOnly(model: Model, knowledge: Knowledge): Check[] {
  return keptChecks(model, knowledge).flatMap(({ given, rule, typed, halfWidth, implied }): Check[] => {
    if (implied === undefined) return []
    const by = typed - implied
    return [
      {
        code: 'checkOnly',
        givens: given ? [placeOf(given)] : [],
        relations: rule ? [rule.id] : [],
        by,
        tolerance: halfWidth,
        agrees: Math.abs(by) <= halfWidth * (1 + 1e-6),
      },
    ]
  })
}

/** A note for each check that nothing is there to be compared with. */
export function uncheckedDiagnostics(model: Model, knowledge: Knowledge): Diagnostic[] {
  return keptChecks(model, knowledge).flatMap(({ given, rule, implied }): Diagnostic[] => {
    if (implied !== undefined) return []
    const what = rule ? `Rule ${rule.id}` : `The check on stream ${given?.stream}`
    return [
      {
        code: 'checkOpen',
        severity: 'note',
        ...(given && { stream: given.stream }),
        ...(given?.component !== undefined && { component: given.component }),
        ...(rule && { id: rule.id }),
        text: `${what} is kept as a check, but the other values do not fix what it is about yet, so there is nothing to compare it with.`,
      },
    ]
  })
}

function keptChecks(model: Model, knowledge: Knowledge): Kept[] {
  const kept: Kept[] = []
  for (const given of model.problem.givens ?? []) {
    if (given.use !== 'check') continue
    const stream = model.streamIndex.get(given.stream) as number
    const measure = namedMeasure(model, stream, given)
    if (!measure) continue
    const { value, halfWidth } = typedValue(model, given)
    kept.push({ given, typed: value, halfWidth, implied: knownMeasure(knowledge, measure) })
  }
  for (const rule of model.problem.relations ?? []) {
    if (rule.use !== 'check' || !('value' in rule)) continue
    const typed = fixedRuleValue(model, rule.value)
    if (typed === undefined) continue
    const implied = commonValue(measuresOfRule(model, rule), knowledge)
    kept.push({ rule, typed, halfWidth: halfWidthOfRule(rule, typed), implied })
  }
  return kept
}

/** What the measures of a rule are all known to be; undefined where one is not, or they differ. */
function commonValue(measures: readonly Measure[], knowledge: Knowledge): number | undefined {
  let common: number | undefined
  for (const measure of measures) {
    // A component that does not enter says nothing of a split.
    if (measure.denominator && knownMeasure(knowledge, { numerator: measure.denominator }) === 0) continue
    const value = knownMeasure(knowledge, measure)
    if (value === undefined) return undefined
    if (common !== undefined && Math.abs(value - common) > 1e-9 * Math.max(Math.abs(value), Math.abs(common)))
      return undefined
    common ??= value
  }
  return common
}
