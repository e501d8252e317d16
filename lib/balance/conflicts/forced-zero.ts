import type { LinearForm } from '../measure/measure'
import { ColumnKind, type Model } from '../model'
import { seededRandom } from '../random'
import { type Assembly, assemble } from '../rows/assemble'
import { type AssemblyOptions, memberOfRule } from '../rows/members'
import type { Typed } from '../rows/row-store'
import { compileRows } from '../sparse/compiled-rows'
import { type Elimination, eliminate } from '../sparse/elimination'
import { fixedValue, type Knowledge } from '../states/knowledge'
import { resolve } from '../states/resolve'
import type { Resolved } from '../states/resolved'
import { type Circuit, Tracer } from './circuit'

/** Members that together leave only a flow of 0 where a fraction or ratio of that flow is typed. */
export type ForcedZero = { form: LinearForm; circuit: Circuit; stream: number | undefined }

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

  const sharp = withoutRatios(model, assembly, options)
  const random = seededRandom(7919)
  const shaken = assemble(model, {
    ...options,
    scaleFractions: true,
    perturb: (value) => value * (1 + 1e-3 * (random() - 0.5)),
  })
  const always = resolve(model, shaken).knowledge
  const ones = new Float64Array(model.nColumns).fill(1)
  const tracer = new Tracer(model, assembly, resolved, { value: ones, size: ones })
  const homogeneous = (zeros: boolean): Elimination => {
    const use = Uint8Array.from({ length: rows.count }, (_, i) =>
      Number(rows.rhs[i] === 0 && (zeros || rows.sources[rows.source[i] as number]?.type !== 'zero')),
    )
    return eliminate(compileRows(rows, model.nColumns, use), assembly.nonNegative)
  }
  for (const form of suspects) {
    if (fixedValue(sharp, form) === 0) continue
    if (fixedValue(always, form) !== 0) continue
    // What rests on the ratios themselves names them; flows that only add up to 0 come second.
    const circuit = tracer.ofForm(homogeneous(false), form) ?? tracer.ofForm(homogeneous(true), form)
    if (!circuit || circuit.weight.size === 0) continue
    return { form, circuit, stream: streamOf(model, form) }
  }
  return undefined
}

const isRatio = (typed: Typed | undefined): boolean =>
  typed?.measure.denominator !== undefined && typed.value !== 0 && typed.value !== 1

/** What holds without the ratios, flows that are 0 for another reason included. */
function withoutRatios(model: Model, { rows }: Assembly, options: AssemblyOptions): Knowledge {
  const leaveOut = new Set(options.leaveOut)
  for (let i = 0; i < rows.count; i++) {
    const source = rows.sources[rows.source[i] as number]
    if (!isRatio(rows.typed[i]) || rows.rhs[i] !== 0) continue
    if (source?.type === 'given') leaveOut.add(source.index)
    if (source?.type === 'rule') leaveOut.add(memberOfRule(model, source.index))
  }
  return resolve(model, assemble(model, { ...options, leaveOut })).knowledge
}

function streamOf(model: Model, form: LinearForm): number | undefined {
  const column = form.columns[0]
  if (form.columns.length !== 1 || column === undefined) return undefined
  const stream = model.totalColumn.indexOf(column)
  if (stream >= 0) return stream
  const other = model.columnKind[column] === ColumnKind.otherTotal ? model.otherTotalColumn.indexOf(column) : -1
  return other >= 0 ? other : undefined
}
