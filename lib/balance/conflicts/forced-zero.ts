import type { LinearForm } from '../measure/measure'
import { ColumnKind, type Model } from '../model'
import { seededRandom } from '../random'
import { type Assembly, assemble } from '../rows/assemble'
import type { AssemblyOptions } from '../rows/members'
import type { Typed } from '../rows/row-store'
import { compileRows } from '../sparse/compiled-rows'
import { eliminate } from '../sparse/elimination'
import { fixedValue, gatherKnowledge } from '../states/knowledge'
import { resolve } from '../states/resolve'
import type { Resolved } from '../states/resolved'
import { type Circuit, Tracer } from './circuit'

/** Members that together leave only a flow of 0 where a fraction or ratio of that flow is typed. */
export type ForcedZero = { circuit: Circuit; stream: number | undefined }

/**
 * A fraction or ratio says something only where there is a flow. Where ratios contradict each other (two compositions of
 * one stream), plain rows answer with a flow of 0; that is no result but a conflict. It is told from a flow that is 0 for
 * a reason (a typed 0, all of it leaves elsewhere, 100 - 100) by asking again without the ratios, and with every number
 * changed a little: only a contradiction needs the ratios and does not depend on their values.
 */
export function findForcedZero(
  model: Model,
  assembly: Assembly,
  resolved: Resolved,
  options: AssemblyOptions,
): ForcedZero | undefined {
  const { rows } = assembly
  const suspects: LinearForm[] = []
  for (let i = 0; i < rows.count; i++) {
    const typed = rows.typed[i]
    const source = rows.sources[rows.source[i] as number]
    if (!typed?.measure.denominator || typed.value === 0) continue
    if (source?.type === 'rule') {
      const rule = model.problem.relations?.[source.index]
      if (rule?.kind !== 'flowRatio' && rule?.kind !== 'componentRatio') continue
    }
    if (fixedValue(resolved.knowledge, typed.measure.denominator) === 0) suspects.push(typed.measure.denominator)
  }
  if (suspects.length === 0) return undefined

  const sharp = keep(model, assembly, (typed, rhs) => !isRatio(typed) || rhs !== 0)
  const random = seededRandom(7919)
  const shaken = assemble(model, {
    ...options,
    scaleFractions: true,
    perturb: (value) => value * (1 + 1e-3 * (random() - 0.5)),
  })
  const always = resolve(model, shaken).knowledge
  const homogeneous = keep(model, assembly, (_, rhs) => rhs === 0)
  for (const form of suspects) {
    if (fixedValue(gather(model, assembly, sharp), form) === 0) continue
    if (fixedValue(always, form) !== 0) continue
    const e = eliminate(compileRows(rows, model.nColumns, homogeneous), assembly.nonNegative)
    const ones = new Float64Array(model.nColumns).fill(1)
    const circuit = new Tracer(model, assembly, resolved, { value: ones, size: ones }).ofForm(e, form)
    if (!circuit || circuit.weight.size === 0) continue
    return { circuit, stream: streamOf(model, form) }
  }
  return undefined
}

const isRatio = (typed: Typed | undefined): boolean =>
  typed?.measure.denominator !== undefined && typed.value !== 0 && typed.value !== 1

function keep(
  model: Model,
  { rows }: Assembly,
  wanted: (typed: Typed | undefined, rhs: number) => boolean,
): Uint8Array {
  return Uint8Array.from({ length: rows.count }, (_, i) =>
    Number(wanted(rows.typed[i], rows.rhs[i] as number) && model.nColumns > 0),
  )
}

const gather = (model: Model, { rows, nonNegative }: Assembly, use: Uint8Array) =>
  gatherKnowledge(eliminate(compileRows(rows, model.nColumns, use), nonNegative))

function streamOf(model: Model, form: LinearForm): number | undefined {
  const column = form.columns[0]
  if (form.columns.length !== 1 || column === undefined) return undefined
  const stream = model.totalColumn.indexOf(column)
  if (stream >= 0) return stream
  const other = model.columnKind[column] === ColumnKind.otherTotal ? model.otherTotalColumn.indexOf(column) : -1
  return other >= 0 ? other : undefined
}
