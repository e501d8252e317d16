import type { Model } from '../model'
import type { Pending } from '../pending/pending'
import { type Assembly, ruleInUse } from '../rows/assemble'
import { measuresOfRule } from '../rows/rules'
import type { Diagnostic } from '../solution'
import { fixedValue, type Knowledge } from './knowledge'

/** A note for each recovery, conversion, split or yield whose inlet is 0, so that it says nothing. */
export function zeroInletDiagnostics(model: Model, knowledge: Knowledge): Diagnostic[] {
  const found: Diagnostic[] = []
  for (const rule of model.problem.relations ?? []) {
    if (!('unit' in rule) || rule.kind === 'selectivity' || !ruleInUse(rule)) continue
    const measures = measuresOfRule(model, rule)
    if (measures.length === 0) continue
    if (measures.every(({ denominator }) => denominator && fixedValue(knowledge, denominator) === 0))
      found.push({
        code: 'zeroInlet',
        severity: 'note',
        unit: rule.unit,
        id: rule.id,
        text: `Nothing of what rule ${rule.id} is about enters unit ${rule.unit}: the rule holds as 0 = 0 and says nothing.`,
      })
  }
  return found
}

/** A note for each rule that could not be used yet; the cells that hang on it stay unknown. */
export function pendingDiagnostics(model: Model, { rows }: Assembly, left: readonly Pending[]): Diagnostic[] {
  const found = new Map<number, Diagnostic>()
  for (const item of left) {
    const source = rows.sources[item.source]
    if (source?.type === 'composition')
      found.set(item.source, {
        code: 'splitterOpen',
        severity: 'note',
        unit: source.unit,
        text: `Splitter ${source.unit}: neither its composition nor its split is known yet, so its outlets' equal composition could not be used. Cells that hang on it stay unknown.`,
      })
    else if (source?.type === 'rule') {
      const id = model.problem.relations?.[source.index]?.id as string
      found.set(item.source, {
        code: 'ruleNotUsed',
        severity: 'note',
        id,
        text: `Rule ${id} multiplies or divides unknowns, so it could not be used yet. Cells that hang on it stay unknown.`,
      })
    }
  }
  return [...found.values()]
}
